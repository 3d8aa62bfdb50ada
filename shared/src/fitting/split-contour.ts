import type { Point } from '../geometry/point';
import { PrefixMoments } from './moments';

/** A stretch of a closed chain: points `first` to `first + count - 1`, counted round the end. */
export interface Stretch {
  readonly kind: 'line' | 'arc';
  readonly first: number;
  readonly count: number;
}

export interface SplitOptions {
  /** What one point may be off by, mm: noise and unevenness together. */
  readonly sigmaMm: number;
  /** What one more line costs, in squared sigmas. */
  readonly linePenalty: number;
  readonly arcPenalty: number;
  readonly minRadiusMm: number;
  readonly maxRadiusMm: number;
  /** An arc bulging less than this is a line. */
  readonly minSagittaMm: number;
}

export const DEFAULT_SPLIT: SplitOptions = {
  sigmaMm: 0.05,
  linePenalty: 60,
  arcPenalty: 90,
  minRadiusMm: 0.8,
  maxRadiusMm: 500,
  minSagittaMm: 0.2,
};

const MAX_NODES = 450;
const MIN_POINTS = 4;

function chordMm(a: Point | undefined, b: Point | undefined): number {
  return a && b ? Math.hypot(a.x - b.x, a.y - b.y) : 0;
}

/** Cheapest split of an open chain whose ends are fixed. */
function splitOpen(points: readonly Point[], options: SplitOptions): readonly Stretch[] {
  const moments = new PrefixMoments(points);
  const step = Math.max(1, Math.ceil(points.length / MAX_NODES));
  const nodes: number[] = [];
  for (let index = 0; index < points.length; index += step) nodes.push(index);
  nodes.push(points.length);
  const perSigma = 1 / (options.sigmaMm * options.sigmaMm);
  const best = new Float64Array(nodes.length).fill(Number.POSITIVE_INFINITY);
  best[0] = 0;
  const previous = new Int32Array(nodes.length);
  const isArc = new Uint8Array(nodes.length);
  for (let to = 1; to < nodes.length; to++) {
    const end = nodes[to] ?? 0;
    for (let from = to - 1; from >= 0; from--) {
      const first = nodes[from] ?? 0;
      const base = best[from] ?? Number.POSITIVE_INFINITY;
      if (end - first < MIN_POINTS || base >= (best[to] ?? 0)) continue;
      const asLine = base + options.linePenalty + moments.line(first, end).squaresMm2 * perSigma;
      if (asLine < (best[to] ?? 0)) {
        best[to] = asLine;
        previous[to] = from;
        isArc[to] = 0;
      }
      if (base + options.arcPenalty >= (best[to] ?? 0)) continue;
      const circle = moments.circle(first, end);
      if (!circle) continue;
      const { radiusMm } = circle.primitive;
      if (radiusMm < options.minRadiusMm || radiusMm > options.maxRadiusMm) continue;
      const chord = chordMm(points[first], points[end - 1]);
      const middle = points[(first + end) >> 1];
      const bulge = chordMm(middle, points[first]) > chord * 0.8 ? radiusMm : (chord * chord) / (8 * radiusMm);
      if (bulge < options.minSagittaMm) continue;
      const asArc = base + options.arcPenalty + circle.squaresMm2 * perSigma;
      if (asArc < (best[to] ?? 0)) {
        best[to] = asArc;
        previous[to] = from;
        isArc[to] = 1;
      }
    }
  }
  const stretches: Stretch[] = [];
  for (let at = nodes.length - 1; at > 0;) {
    const from = previous[at] ?? 0;
    const first = nodes[from] ?? 0;
    stretches.unshift({ kind: isArc[at] === 1 ? 'arc' : 'line', first, count: (nodes[at] ?? 0) - first });
    at = from;
  }
  return stretches;
}

/**
 * Splits a closed chain of points into lines and arcs: the cheapest split by dynamic programming, each stretch paying
 * for its squared distances and a fixed price. The chain is opened at a joint that a first pass found.
 * Fewer than eight points give no stretches.
 */
export function splitContour(points: readonly Point[], options: SplitOptions = DEFAULT_SPLIT): readonly Stretch[] {
  if (points.length < 2 * MIN_POINTS) return [];
  const firstPass = splitOpen(points, options);
  const longest = firstPass.reduce((a, b) => (b.count > a.count ? b : a));
  const joint = firstPass.length > 1 ? (longest.first + longest.count) % points.length : 0;
  if (joint === 0) return firstPass;
  const turned = [...points.slice(joint), ...points.slice(0, joint)];
  return splitOpen(turned, options).map((stretch) => ({ ...stretch, first: (stretch.first + joint) % points.length }));
}
