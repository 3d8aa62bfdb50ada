import type { Feature, Layout } from '@foldwright/shared/bending/layout';
import { pointInLoop } from '@foldwright/shared/geometry/loop';
import type { Loop } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { COINCIDENT_MM } from '@foldwright/shared/geometry/tolerance';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { formatDecimal } from '@foldwright/shared/units/length';
import { edgesOfLoop, featureCentre } from '../geometry/layout-edges';
import { type Viewport, toLayout, toScreen } from '../viewport';

/** A few words on the metal, or in ink where a large hole shows the bench. */
export interface DrawnNote {
  readonly key: string;
  readonly lines: readonly string[];
  readonly xPx: number;
  readonly yPx: number;
  readonly turnDeg: number;
  readonly anchor: 'start' | 'middle' | 'end';
  /** From the thing to the words, or nothing. */
  readonly leader: string;
  readonly isOnMetal: boolean;
}

/** Measures of the note's face, px: advance of a letter, line height, height of capitals over the base line. */
const LETTER_PX = 7.9;
const LINE_PX = 16;
const CAPITAL_PX = 11;
/** A hole that large holds its own words. */
const ROOMY_RADIUS_PX = 40;
/** Words may lie over so much of something else; more, and neither can be read. */
const MOST_COVERED_PX2 = 90;

interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/**
 * Words along each bend, and at the first hole or slot of each kind ("4 × M5, Ø 5.5"), placed where they cover nothing
 * else if there is such a place.
 */
export function drawingNotes(
  layout: Layout,
  viewport: Viewport,
  names: ReadonlyMap<string, string>,
): readonly DrawnNote[] {
  const taken: Box[] = layout.features.map((feature) => featureBox(feature, viewport));
  const bends = bendNotes(layout, viewport, names);
  taken.push(...bends.map(noteBox));
  const sheet = edgesOfLoop(layout.outer).map(({ segment }) => segment);
  const openings = openingGroups(layout).flatMap((group) => {
    const note = placeNote(group, viewport, taken, sheet);
    if (note === null) return [];
    taken.push(noteBox(note));
    return [note];
  });
  return [...bends, ...openings];
}

function bendNotes(layout: Layout, viewport: Viewport, names: ReadonlyMap<string, string>): readonly DrawnNote[] {
  return layout.bends.flatMap((bend): readonly DrawnNote[] => {
    const from = toScreen(viewport, bend.line.from);
    const to = toScreen(viewport, bend.line.to);
    const words = `${names.get(bend.id) ?? ''} ${bend.direction} ${formatDecimal(bend.bendAngleDeg, 1)}°`;
    if (Math.hypot(to.xPx - from.xPx, to.yPx - from.yPx) < words.length * LETTER_PX) return [];
    const raw = (Math.atan2(to.yPx - from.yPx, to.xPx - from.xPx) * 180) / Math.PI;
    // Words read from the left or from below, never upside down.
    const turnDeg = raw > 89.9 ? raw - 180 : raw <= -90.1 ? raw + 180 : raw;
    const turnRad = (turnDeg * Math.PI) / 180;
    // A little off the crease, towards the base panel when the bend is not at it.
    const middle = { x: (bend.line.from.x + bend.line.to.x) / 2, y: (bend.line.from.y + bend.line.to.y) / 2 };
    const toBase = { x: layout.baseAnchor.x - middle.x, y: -(layout.baseAnchor.y - middle.y) };
    const isBelow = toBase.x * -Math.sin(turnRad) + toBase.y * Math.cos(turnRad) > 0;
    const asidePx = isBelow ? 20 : -9;
    const note = {
      key: bend.id,
      lines: [words],
      xPx: (from.xPx + to.xPx) / 2 - Math.sin(turnRad) * asidePx,
      yPx: (from.yPx + to.yPx) / 2 + Math.cos(turnRad) * asidePx,
      turnDeg,
      anchor: 'middle' as const,
      leader: '',
      isOnMetal: true,
    };
    return [note];
  });
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

/**
 * The place on the sheet, at any of the group's things and on any side of it, where the words cover least. Words that find
 * no room on the metal are left out: letters over lines or on the card can't be read, and the list has every size.
 */
function placeNote(
  { key, lines, features }: OpeningGroup,
  viewport: Viewport,
  taken: readonly Box[],
  sheet: Loop,
): DrawnNote | null {
  let best: DrawnNote | null = null;
  let least = Infinity;
  for (const feature of features) {
    const at = toScreen(viewport, featureCentre(feature));
    const radiusPx = (sizeMm(feature) / 2) * viewport.pxPerMm;
    if (radiusPx > ROOMY_RADIUS_PX && feature.kind === 'hole') {
      const yPx = at.yPx - ((lines.length - 1) * LINE_PX) / 2 + CAPITAL_PX / 2;
      return { key, lines, xPx: at.xPx, yPx, turnDeg: 0, anchor: 'middle', leader: '', isOnMetal: false };
    }
    for (const candidate of besides(key, lines, at.xPx, at.yPx, reachPx(feature, viewport))) {
      const box = noteBox(candidate);
      if (!isOnSheet(box, viewport, sheet)) continue;
      const covered = taken.reduce((sum, other) => sum + overlapPx(box, other), 0);
      if (covered < least) [best, least] = [candidate, covered];
    }
  }
  return least > MOST_COVERED_PX2 ? null : best;
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

function noteBox(note: DrawnNote): Box {
  const widthPx = Math.max(...note.lines.map((line) => line.length)) * LETTER_PX;
  const heightPx = (note.lines.length - 1) * LINE_PX + CAPITAL_PX + 4;
  if (Math.abs(note.turnDeg) > 45) {
    return {
      left: note.xPx - CAPITAL_PX,
      right: note.xPx + 4,
      top: note.yPx - widthPx / 2,
      bottom: note.yPx + widthPx / 2,
    };
  }
  const left = note.anchor === 'start' ? note.xPx : note.anchor === 'end' ? note.xPx - widthPx : note.xPx - widthPx / 2;
  return { left, right: left + widthPx, top: note.yPx - CAPITAL_PX, bottom: note.yPx - CAPITAL_PX + heightPx };
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

function overlapPx(a: Box, b: Box): number {
  const across = Math.min(a.right, b.right) - Math.max(a.left, b.left);
  const down = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
  return across > 0 && down > 0 ? across * down : 0;
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
