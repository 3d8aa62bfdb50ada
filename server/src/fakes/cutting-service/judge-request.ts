import type { Contour, Drawing } from './read-drawing';
import { findSheet } from './sheet-list';
import type { ShopSheet } from './sheet-list';
import type { QuoteRequest, Readings } from './wire';

export interface Reason {
  readonly code: string;
  readonly text: string;
}

export type Judgement =
  | { readonly canMake: true; readonly sheet: ShopSheet; readonly readings: Readings }
  | { readonly canMake: false; readonly reasons: readonly Reason[] };

/** What the invented shop's machines can do. Limits of its own, in mm. */
const SHOP = {
  bedWidthMm: 1500,
  bedLengthMm: 3000,
  smallestBlankMm: 15,
  smallestHoleOverT: 0.8,
  mostBends: 12,
  longestBendMm: 2500,
  thickestBentMm: 6,
  mostPieces: 2000,
  steepestBendDeg: 150,
} as const;

const OUTLINE = 'OUTLINE';

/** Whether the shop can make it, with every reason against it. The drawing is measured here, nothing is believed. */
export function judgeRequest(request: QuoteRequest, drawing: Drawing): Judgement {
  const reasons: Reason[] = [];
  const against = (code: string, text: string) => void reasons.push({ code, text });

  const sheet = findSheet(request.material, request.thicknessMm);
  if (typeof sheet === 'string') against('not-stocked', sheet);
  const outlines = drawing.contours.filter((contour) => contour.layer === OUTLINE);
  const [outline] = outlines;
  if (outline === undefined) against('no-outline', 'There is nothing on the layer OUTLINE.');
  else if (outlines.length > 1 && outlines.every((contour) => contour.isClosed)) {
    against('several-outlines', `There are ${outlines.length} outlines; one drawing is one part.`);
  }
  for (const contour of drawing.contours.filter((contour) => !contour.isClosed)) {
    against('open-contour', `A contour on ${contour.layer} near ${place(contour)} is not closed.`);
  }
  for (const contour of drawing.contours) {
    const smallest = SHOP.smallestHoleOverT * request.thicknessMm;
    if (contour.diameterMm !== null && contour.diameterMm < smallest) {
      against(
        'hole-too-small',
        `The hole of ${contour.diameterMm.toFixed(2)} mm at ${place(contour)} is below our ${smallest.toFixed(2)} mm for this sheet.`,
      );
    }
    if (outline !== undefined && contour.layer !== OUTLINE && reachesOut(contour, outline)) {
      against('opening-outside', `An opening near ${place(contour)} lies outside of the outline.`);
    }
  }
  if (outline !== undefined) {
    const sides = [outline.maxX - outline.minX, outline.maxY - outline.minY].sort((a, b) => a - b);
    const [short = 0, long = 0] = sides;
    if (short > SHOP.bedWidthMm || long > SHOP.bedLengthMm) {
      against(
        'blank-too-large',
        `The blank is ${long.toFixed(0)} × ${short.toFixed(0)} mm; our bed takes 3000 × 1500 mm.`,
      );
    }
    if (short < SHOP.smallestBlankMm) {
      against('blank-too-small', `The blank is ${short.toFixed(1)} mm wide; below 15 mm it falls through the grid.`);
    }
  }
  judgeBends(request, drawing, against);
  for (const quantity of request.quantities.filter((wanted) => wanted > SHOP.mostPieces)) {
    against('too-many-pieces', `${quantity} pieces are more than we take in one order (2000).`);
  }
  if (reasons.length > 0 || typeof sheet === 'string' || outline === undefined) return { canMake: false, reasons };
  return {
    canMake: true,
    sheet,
    readings: {
      widthMm: outline.maxX - outline.minX,
      heightMm: outline.maxY - outline.minY,
      cutLengthMm: drawing.contours.reduce((sum, contour) => sum + contour.lengthMm, 0),
      pierces: drawing.contours.length,
      bendLines: drawing.foldLines.length,
    },
  };
}

function judgeBends(request: QuoteRequest, drawing: Drawing, against: (code: string, text: string) => void): void {
  const { bends } = request;
  if (bends.length > SHOP.mostBends)
    against('too-many-bends', `${bends.length} bends; we take up to ${SHOP.mostBends} in one part.`);
  if (bends.length > 0 && request.thicknessMm > SHOP.thickestBentMm) {
    against('too-thick-to-bend', `We bend up to ${SHOP.thickestBentMm} mm, this is ${request.thicknessMm} mm.`);
  }
  for (const bend of bends) {
    if (bend.lengthMm > SHOP.longestBendMm) {
      against('bend-too-long', `Bend ${bend.name} is ${bend.lengthMm.toFixed(0)} mm long; our brake has 2500 mm.`);
    }
    if (bend.angleDeg > SHOP.steepestBendDeg) {
      against('bend-too-sharp', `Bend ${bend.name} turns by ${bend.angleDeg}°; we stop at ${SHOP.steepestBendDeg}°.`);
    }
  }
  for (const [layer, direction] of [
    ['FOLD-TOWARD', 'toward'],
    ['FOLD-AWAY', 'away'],
  ] as const) {
    const rows = bends.filter((bend) => bend.direction === direction).length;
    const lines = drawing.foldLines.filter((line) => line.layer === layer);
    // A bend that an opening interrupts has several lines on one straight, and two bends may share a straight.
    const straights = countStraights(lines);
    if (rows < straights || rows > lines.length) {
      against(
        'bends-do-not-match',
        `The table has ${rows} bends on ${layer}, the drawing shows ${lines.length} ${lines.length === 1 ? 'line' : 'lines'} there.`,
      );
    }
  }
}

const place = (contour: Contour) =>
  `x ${((contour.minX + contour.maxX) / 2).toFixed(1)}, y ${((contour.minY + contour.maxY) / 2).toFixed(1)}`;

const reachesOut = (inner: Contour, outer: Contour) =>
  inner.minX < outer.minX || inner.minY < outer.minY || inner.maxX > outer.maxX || inner.maxY > outer.maxY;

/** How many different straights the lines lie on, to 0.1 mm and about 0.1°. */
function countStraights(lines: Drawing['foldLines']): number {
  const kept: Drawing['foldLines'][number][] = [];
  for (const line of lines) {
    const isKnown = kept.some((known) => offsetFrom(known, line.from) < 0.1 && offsetFrom(known, line.to) < 0.1);
    if (!isKnown) kept.push(line);
  }
  return kept.length;
}

function offsetFrom(line: Drawing['foldLines'][number], point: { x: number; y: number }): number {
  const [dx, dy] = [line.to.x - line.from.x, line.to.y - line.from.y];
  return Math.abs(dx * (point.y - line.from.y) - dy * (point.x - line.from.x)) / Math.hypot(dx, dy);
}
