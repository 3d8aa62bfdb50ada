import type { Point } from '../geometry/point';
import { joinTwo } from './joints';
import type { Stretch } from './split-contour';
import { distanceToPrimitive, fitAlone, rmsMm, stretchPoints, trimmed } from './stretch-fit';

/**
 * Pieces this short beside a corner are taken for its blur when the neighbours meet this near to them, mm. The price:
 * fillets under about 1.8 mm come out as sharp corners.
 */
const SLIVER_MM = 2.2;
const SLIVER_MEETS_WITHIN_MM = 0.75;
const SLIVER_OFF_MM = 0.5;
/** How near one line or circle keeps to the points of two neighbours that become one, mm. */
const MERGE_WITHIN_MM = 0.2;
const MERGE_RMS_MM = 0.07;
/** The same for two lines that are nearly one: a shadow at the foot bends an edge by as much. */
const STRAIGHT_WITHIN_MM = 0.32;
const STRAIGHT_RMS_MM = 0.11;
const STRAIGHT_WITHIN_DEG = 0.7;

/** A stretch while slivers are taken away: whether it has taken one already, at either end. */
interface Growing extends Stretch {
  readonly hasGrownAtStart: boolean;
  readonly hasGrownAtEnd: boolean;
}

/** The stretches without those that only follow the blur of a corner: their points go to both neighbours. */
export function withoutSlivers(stretches: readonly Stretch[], points: readonly Point[]): readonly Stretch[] {
  const kept: Growing[] = stretches.map((stretch) => ({ ...stretch, hasGrownAtStart: false, hasGrownAtEnd: false }));
  for (let index = 0; index < kept.length && kept.length > 3; index++) {
    const at = { before: (index + kept.length - 1) % kept.length, after: (index + 1) % kept.length };
    const [before, sliver, after] = [kept[at.before], kept[index], kept[at.after]];
    if (!before || !sliver || !after || !isCornerBlur(before, sliver, after, points)) continue;
    const half = sliver.count >> 1;
    kept[at.before] = { ...before, count: before.count + half, hasGrownAtEnd: true };
    kept[at.after] = {
      ...after,
      first: (sliver.first + half) % points.length,
      count: after.count + sliver.count - half,
      hasGrownAtStart: true,
    };
    kept.splice(index, 1);
    index--;
  }
  return kept.map(({ kind, first, count }) => ({ kind, first, count }));
}

/** Whether a stretch is short and its neighbours, carried on, make a corner near it. Two slivers in a row are a curve. */
function isCornerBlur(before: Growing, sliver: Growing, after: Growing, points: readonly Point[]): boolean {
  if (before.hasGrownAtEnd || after.hasGrownAtStart || sliver.hasGrownAtStart || sliver.hasGrownAtEnd) return false;
  const own = stretchPoints(points, sliver);
  const [first, middle, last] = [own[0], own[own.length >> 1], own.at(-1)];
  if (!first || !last || !middle || Math.hypot(first.x - last.x, first.y - last.y) > SLIVER_MM) return false;
  const a = fitAlone(trimmed(stretchPoints(points, before)), before.kind);
  const b = fitAlone(trimmed(stretchPoints(points, after)), after.kind);
  const meeting = joinTwo(a, b, middle);
  return (
    Math.hypot(meeting.at.x - middle.x, meeting.at.y - middle.y) < SLIVER_MEETS_WITHIN_MM &&
    own.every(
      (point) =>
        Math.min(Math.abs(distanceToPrimitive(a, point)), Math.abs(distanceToPrimitive(b, point))) < SLIVER_OFF_MM,
    )
  );
}

/** Neighbours that one line or one circle serves as well, within what shadows bend an edge, become one. */
export function mergeNeighbours(stretches: readonly Stretch[], points: readonly Point[]): readonly Stretch[] {
  let kept = stretches;
  while (kept.length > 3) {
    let best: { readonly index: number; readonly stretch: Stretch; readonly rmsMm: number } | null = null;
    for (let index = 0; index < kept.length; index++) {
      const union = unionOf(kept[index], kept[(index + 1) % kept.length], points);
      if (union !== null && (best === null || union.rmsMm < best.rmsMm)) best = { index, ...union };
    }
    if (best === null) return kept;
    const { index, stretch } = best;
    const isLast = index === kept.length - 1;
    kept = isLast ? [stretch, ...kept.slice(1, -1)] : kept.toSpliced(index, 2, stretch);
  }
  return kept;
}

/** Angle between the lines through two stretches, degrees. */
function turnDeg(before: Stretch, after: Stretch, points: readonly Point[]): number {
  const [a, b] = [before, after].map((stretch) => fitAlone(trimmed(stretchPoints(points, stretch)), 'line'));
  if (a?.kind !== 'line' || b?.kind !== 'line') return Number.POSITIVE_INFINITY;
  const sine = Math.abs(a.nx * b.ny - a.ny * b.nx);
  return (Math.asin(Math.min(1, sine)) * 180) / Math.PI;
}

/** Two neighbours as one stretch, or `null` when no single line or circle keeps near enough to their points. */
function unionOf(
  before: Stretch | undefined,
  after: Stretch | undefined,
  points: readonly Point[],
): { readonly stretch: Stretch; readonly rmsMm: number } | null {
  if (!before || !after) return null;
  const count = before.count + after.count;
  const used = trimmed(stretchPoints(points, { ...before, count }));
  const kinds = before.kind === 'line' && after.kind === 'line' ? (['line'] as const) : (['line', 'arc'] as const);
  const isStraight = kinds.length === 1 && turnDeg(before, after, points) <= STRAIGHT_WITHIN_DEG;
  const [withinMm, mostRmsMm] = isStraight ? [STRAIGHT_WITHIN_MM, STRAIGHT_RMS_MM] : [MERGE_WITHIN_MM, MERGE_RMS_MM];
  for (const kind of kinds) {
    const primitive = fitAlone(used, kind);
    if (primitive.kind !== kind) continue;
    const rms = rmsMm(primitive, used);
    const isNear = used.every((point) => Math.abs(distanceToPrimitive(primitive, point)) <= withinMm);
    if (rms <= mostRmsMm && isNear) return { stretch: { kind, first: before.first, count }, rmsMm: rms };
  }
  return null;
}
