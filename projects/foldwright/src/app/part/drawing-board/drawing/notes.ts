import type { Feature, Layout } from '@foldwright/shared/bending/layout';
import { pointInLoop } from '@foldwright/shared/geometry/loop';
import type { Loop } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { COINCIDENT_MM } from '@foldwright/shared/geometry/tolerance';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { formatDecimal } from '@foldwright/shared/units/length';
import { edgesOfLoop, featureCentre } from '../geometry/layout-edges';
import { type Viewport, toLayout, toScreen } from '../viewport';
import {
  ABOVE_CREASE_PX,
  BELOW_CREASE_PX,
  type Box,
  CAPITAL_PX,
  type DrawnNote,
  LETTER_PX,
  LINE_PX,
  boxesAlong,
  isFree,
  noteBox,
} from './note-room';

/** A hole that large holds its own words. */
const ROOMY_RADIUS_PX = 40;
/** Where along a crease its words may stand, as shares of its length, the best first. */
const ALONG_CREASE = [0.5, 0.3, 0.7, 0.2, 0.8] as const;

/**
 * Words along each bend, and at the first hole or slot of each kind ("4 × M5, Ø 5.5"), each where it covers nothing else.
 * Words that find no such place are left out: letters over lines can't be read, and the list has every size.
 */
export function drawingNotes(
  layout: Layout,
  viewport: Viewport,
  names: ReadonlyMap<string, string>,
): readonly DrawnNote[] {
  const taken: Box[] = layout.features.map((feature) => featureBox(feature, viewport));
  for (const { line } of layout.bends)
    taken.push(...boxesAlong(toScreen(viewport, line.from), toScreen(viewport, line.to)));
  const bends = layout.bends.flatMap((bend): readonly DrawnNote[] => {
    const free = bendPlaces(bend, layout, viewport, names).find((note) => isFree(noteBox(note), taken));
    if (free === undefined) return [];
    taken.push(noteBox(free));
    return [free];
  });
  const sheet = edgesOfLoop(layout.outer).map(({ segment }) => segment);
  const openings = openingGroups(layout).flatMap((group) => {
    const note = placeNote(group, viewport, taken, sheet);
    if (note === null) return [];
    taken.push(noteBox(note));
    return [note];
  });
  return [...bends, ...openings];
}

/** Every place along a crease where its words may stand, the best first: a little off it, on the side of the base panel. */
function bendPlaces(
  bend: Layout['bends'][number],
  layout: Layout,
  viewport: Viewport,
  names: ReadonlyMap<string, string>,
): readonly DrawnNote[] {
  const from = toScreen(viewport, bend.line.from);
  const to = toScreen(viewport, bend.line.to);
  const lengthPx = Math.hypot(to.xPx - from.xPx, to.yPx - from.yPx);
  const words = `${names.get(bend.id) ?? ''} ${bend.direction} ${formatDecimal(bend.bendAngleDeg, 1)}°`;
  const wordsPx = words.length * LETTER_PX;
  const raw = (Math.atan2(to.yPx - from.yPx, to.xPx - from.xPx) * 180) / Math.PI;
  // Words read from the left or from below, never upside down.
  const turnDeg = raw > 89.9 ? raw - 180 : raw <= -90.1 ? raw + 180 : raw;
  const turnRad = (turnDeg * Math.PI) / 180;
  const middle = { x: (bend.line.from.x + bend.line.to.x) / 2, y: (bend.line.from.y + bend.line.to.y) / 2 };
  const toBase = { x: layout.baseAnchor.x - middle.x, y: -(layout.baseAnchor.y - middle.y) };
  const isBaseBelow = toBase.x * -Math.sin(turnRad) + toBase.y * Math.cos(turnRad) > 0;
  const asides = isBaseBelow ? [BELOW_CREASE_PX, ABOVE_CREASE_PX] : [ABOVE_CREASE_PX, BELOW_CREASE_PX];
  return asides.flatMap((asidePx) =>
    ALONG_CREASE.flatMap((share): readonly DrawnNote[] => {
      if (Math.min(share, 1 - share) * lengthPx < wordsPx / 2) return [];
      return [
        {
          key: bend.id,
          lines: [words],
          xPx: from.xPx + (to.xPx - from.xPx) * share - Math.sin(turnRad) * asidePx,
          yPx: from.yPx + (to.yPx - from.yPx) * share + Math.cos(turnRad) * asidePx,
          turnDeg,
          anchor: 'middle',
          leader: '',
          isOnMetal: true,
        },
      ];
    }),
  );
}

interface OpeningGroup {
  readonly key: string;
  readonly lines: readonly string[];
  readonly features: readonly Feature[];
}

function openingGroups(layout: Layout): readonly OpeningGroup[] {
  const groups = new Map<string, { readonly words: readonly string[]; readonly features: Feature[] }>();
  for (const feature of layout.features) {
    const words = featureWords(feature);
    const key = words.join(' ');
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { words, features: [feature] });
    else group.features.push(feature);
  }
  return [...groups.entries()].map(([key, { words, features }]) => {
    const first = words[0] ?? '';
    return { key, features, lines: [features.length > 1 ? `${features.length} × ${first}` : first, ...words.slice(1)] };
  });
}

/** The first place on the sheet, at any of the group's things and on any side of it, where the words cover nothing. */
function placeNote(
  { key, lines, features }: OpeningGroup,
  viewport: Viewport,
  taken: readonly Box[],
  sheet: Loop,
): DrawnNote | null {
  for (const feature of features) {
    const at = toScreen(viewport, featureCentre(feature));
    const radiusPx = (sizeMm(feature) / 2) * viewport.pxPerMm;
    if (radiusPx > ROOMY_RADIUS_PX && feature.kind === 'hole') {
      const yPx = at.yPx - ((lines.length - 1) * LINE_PX) / 2 + CAPITAL_PX / 2;
      return { key, lines, xPx: at.xPx, yPx, turnDeg: 0, anchor: 'middle', leader: '', isOnMetal: false };
    }
    for (const candidate of besides(key, lines, at.xPx, at.yPx, reachPx(feature, viewport))) {
      const box = noteBox(candidate);
      if (isOnSheet(box, viewport, sheet) && isFree(box, taken)) return candidate;
    }
  }
  return null;
}

function isOnSheet(box: Box, viewport: Viewport, sheet: Loop): boolean {
  const corners = [box.left, (box.left + box.right) / 2, box.right].flatMap((xPx) =>
    [box.top, box.bottom].map((yPx) => toLayout(viewport, { xPx, yPx })),
  );
  return corners.every((corner) => pointInLoop(corner, sheet, COINCIDENT_MM) !== 'outside');
}

/** Below right, above right, below left, above left, right below and right above a thing. */
function besides(
  key: string,
  lines: readonly string[],
  xPx: number,
  yPx: number,
  reach: { readonly xPx: number; readonly yPx: number },
): readonly DrawnNote[] {
  const blockPx = (lines.length - 1) * LINE_PX;
  const base = { key, lines, turnDeg: 0, isOnMetal: true } as const;
  const corners = [1, -1].flatMap((side) =>
    [1, -1].map((down): DrawnNote => {
      const from = { x: xPx + side * reach.xPx * 0.71, y: yPx + down * reach.yPx * 0.71 };
      const to = { x: from.x + side * 12, y: from.y + down * 12 };
      return {
        ...base,
        xPx: to.x + side * 3,
        yPx: down > 0 ? to.y + CAPITAL_PX / 2 : to.y + CAPITAL_PX / 2 - blockPx,
        anchor: side > 0 ? 'start' : 'end',
        leader: `M${from.x} ${from.y}L${to.x} ${to.y}`,
      };
    }),
  );
  const straight = [1, -1].map((down): DrawnNote => {
    const edge = yPx + down * (reach.yPx + 7);
    return { ...base, xPx, yPx: down > 0 ? edge + CAPITAL_PX : edge - blockPx, anchor: 'middle', leader: '' };
  });
  return [...straight, ...corners];
}

function featureBox(feature: Feature, viewport: Viewport): Box {
  const at = toScreen(viewport, featureCentre(feature));
  const reach = reachPx(feature, viewport);
  return { left: at.xPx - reach.xPx, right: at.xPx + reach.xPx, top: at.yPx - reach.yPx, bottom: at.yPx + reach.yPx };
}

function reachPx(feature: Feature, viewport: Viewport): { readonly xPx: number; readonly yPx: number } {
  const radius = sizeMm(feature) / 2;
  if (feature.kind === 'hole') return { xPx: radius * viewport.pxPerMm, yPx: radius * viewport.pxPerMm };
  return {
    xPx: (radius + Math.abs(feature.to.x - feature.from.x) / 2) * viewport.pxPerMm,
    yPx: (radius + Math.abs(feature.to.y - feature.from.y) / 2) * viewport.pxPerMm,
  };
}

function sizeMm(feature: Feature): number {
  return feature.kind === 'slot' ? feature.widthMm : (findHoleDiameterMm(feature.purpose) ?? 0);
}

function slotLengthMm(from: Point, to: Point, widthMm: number): number {
  return Math.hypot(to.x - from.x, to.y - from.y) + widthMm;
}

function featureWords(feature: Feature): readonly string[] {
  if (feature.kind === 'slot') {
    const lengthMm = slotLengthMm(feature.from, feature.to, feature.widthMm);
    return [`slot ${formatDecimal(feature.widthMm, 1)} × ${formatDecimal(lengthMm, 1)}`];
  }
  const size = `Ø ${formatDecimal(sizeMm(feature), 2)}`;
  const { purpose } = feature;
  switch (purpose.kind) {
    case 'clearance':
      return [purpose.thread, size];
    case 'tapped':
      return [`${purpose.thread} tapped`];
    case 'rivet-nut':
      return [`${purpose.thread} rivet nut`];
    case 'countersunk':
      return [`${purpose.thread} countersunk`];
    case 'pass-through':
      return [size, 'pass-through'];
    case 'lightening':
    case 'plain':
      return [size];
  }
}
