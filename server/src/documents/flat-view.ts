import type { FlatBend, FlatPattern } from '@foldwright/shared/bending/development';
import { planCutFile } from '@foldwright/shared/drawing/cut-plan';
import type { Point } from '@foldwright/shared/geometry/point';
import type { PdfSheet, StrokeStyle } from './pdf-sheet';

/** Line kinds of a developed blank. Source: ISO 128-2 (wide continuous for cut edges, narrow for what is bent). */
const CUT: StrokeStyle = { widthMm: 0.5 };
const TANGENT: StrokeStyle = { widthMm: 0.13, colour: '#6F7A82' };
const FOLD_TOWARDS: StrokeStyle = { widthMm: 0.25, colour: '#2B3F8F', dashMm: [3, 1.5] };
const FOLD_AWAY: StrokeStyle = { widthMm: 0.25, colour: '#2B3F8F', dashMm: [4, 1.2, 0.6, 1.2] };
const CENTRE: StrokeStyle = { widthMm: 0.13, colour: '#595145' };

export interface FlatViewPlace {
  /** Millimetres on paper for one millimetre of part. */
  readonly scale: number;
  /** Where a point of the blank comes to lie on the page. */
  readonly place: (point: Point) => Point;
}

/** Draws the blank's edges, openings, bend zones and fold lines; the same for the drawing and the full-size print. */
export function drawFlat(sheet: PdfSheet, flat: FlatPattern, view: FlatViewPlace): void {
  const { place, scale } = view;
  sheet.loop(flat.outer, place, CUT);
  for (const cutout of flat.cutouts) sheet.loop(cutout, place, CUT);
  for (const hole of flat.holes) {
    sheet.circle(place(hole.centre), hole.diameterMm * scale, CUT);
    drawCentreMark(sheet, place(hole.centre), (hole.diameterMm * scale) / 2 + 1.5);
  }
  for (const entity of planCutFile({ ...flat, cutouts: [], holes: [], bends: [] })) {
    if (entity.kind === 'contour' && entity.layer === 'OPENING') {
      const [a, b, c, d] = entity.corners.map((corner) => corner.at);
      if (a && b && c && d) drawObround(sheet, [a, b, c, d], view);
    }
  }
  for (const bend of flat.bends) {
    for (const line of bend.tangentLines) sheet.line(place(line.from), place(line.to), TANGENT);
    const style = bend.direction === 'towards' ? FOLD_TOWARDS : FOLD_AWAY;
    for (const line of bend.centreLines) sheet.line(place(line.from), place(line.to), style);
  }
}

/** Corners in the order of the cut plan: straight, end round, straight, end round. */
function drawObround(
  sheet: PdfSheet,
  [a, b, c, d]: readonly [Point, Point, Point, Point],
  { place }: FlatViewPlace,
): void {
  const middle = (first: Point, second: Point): Point => ({ x: (first.x + second.x) / 2, y: (first.y + second.y) / 2 });
  sheet.loop(
    [
      { kind: 'line', from: a, to: b },
      { kind: 'arc', from: b, to: c, centre: middle(b, c), clockwise: false },
      { kind: 'line', from: c, to: d },
      { kind: 'arc', from: d, to: a, centre: middle(d, a), clockwise: false },
    ],
    place,
    CUT,
  );
}

function drawCentreMark(sheet: PdfSheet, at: Point, reachMm: number): void {
  sheet.line({ x: at.x - reachMm, y: at.y }, { x: at.x + reachMm, y: at.y }, CENTRE);
  sheet.line({ x: at.x, y: at.y - reachMm }, { x: at.x, y: at.y + reachMm }, CENTRE);
}

export const bendWords = (bend: FlatBend): string =>
  `${bend.name} ${bend.direction} ${Number(bend.bendAngleDeg.toFixed(1))}° R ${Number(bend.insideRadiusMm.toFixed(2))}`;

/** Writes each bend's words along its longest piece of fold line, so that they read from below or from the right. */
export function labelBends(sheet: PdfSheet, flat: FlatPattern, view: FlatViewPlace, sizeMm: number): void {
  for (const bend of flat.bends) {
    const longest = [...bend.centreLines].sort((a, b) => lengthOf(b) - lengthOf(a))[0];
    if (!longest) continue;
    const from = view.place(longest.from);
    const to = view.place(longest.to);
    let turnDeg = (Math.atan2(to.y - from.y, to.x - from.x) * 180) / Math.PI;
    if (turnDeg > 90 + 1) turnDeg -= 180;
    if (turnDeg <= -90 + 1) turnDeg += 180;
    const turn = (turnDeg * Math.PI) / 180;
    const lift = 1.1;
    sheet.text(
      bendWords(bend),
      { x: (from.x + to.x) / 2 - lift * Math.sin(turn), y: (from.y + to.y) / 2 + lift * Math.cos(turn) },
      { font: 'monoItalic', sizeMm, colour: '#2B3F8F', align: 'centre', turnDeg },
    );
  }
}

/** H1, H2, ... and S1, S2, ... beside their openings, in the order of the table. */
export function labelOpenings(sheet: PdfSheet, flat: FlatPattern, view: FlatViewPlace, sizeMm: number): void {
  flat.holes.forEach((hole, index) => {
    const at = view.place(hole.centre);
    const reach = (hole.diameterMm * view.scale) / 2;
    sheet.text(
      `H${index + 1}`,
      { x: at.x + reach * 0.75 + 0.8, y: at.y + reach * 0.75 + 0.8 },
      { font: 'monoItalic', sizeMm },
    );
  });
  flat.slots.forEach((slot, index) => {
    const at = view.place({ x: (slot.from.x + slot.to.x) / 2, y: (slot.from.y + slot.to.y) / 2 });
    sheet.text(`S${index + 1}`, { x: at.x, y: at.y - sizeMm / 3 }, { font: 'monoItalic', sizeMm, align: 'centre' });
  });
}

const lengthOf = (line: { readonly from: Point; readonly to: Point }): number =>
  Math.hypot(line.to.x - line.from.x, line.to.y - line.from.y);
