/** Scores a trace against the truth with its own geometry: nothing here comes from the product. All lengths are mm. */

type Pair = readonly [number, number];

export interface ScoredLine {
  readonly kind: 'line';
  readonly from: Pair;
  readonly to: Pair;
}

export interface ScoredArc {
  readonly kind: 'arc';
  readonly from: Pair;
  readonly to: Pair;
  readonly centre: Pair;
  readonly clockwise: boolean;
}

export type ScoredPrimitive = ScoredLine | ScoredArc;

export interface ScoredOutline {
  readonly outer: readonly ScoredPrimitive[];
  readonly cutouts: readonly (readonly ScoredPrimitive[])[];
  readonly holes: readonly { readonly centre: Pair; readonly diameterMm: number }[];
  readonly slots: readonly { readonly from: Pair; readonly to: Pair; readonly widthMm: number }[];
}

export interface ScoredTrace extends ScoredOutline {
  readonly bands: readonly { readonly primitiveIndex: number; readonly halfWidthMm: number }[];
}

export interface TraceScore {
  readonly meanMm: number;
  readonly p99Mm: number;
  readonly maxMm: number;
  /** Worst distance between the centres of a true round opening and the traced one nearest to it. */
  readonly worstCentreMm: number;
  readonly worstDiameterMm: number;
  /** Share of the outer boundary that lies within the band stated for it. */
  readonly insideBand: number;
  readonly medianHalfWidthMm: number;
  /** Largest gap between the end of one primitive and the start of the next. */
  readonly worstGapMm: number;
}

const STEP_MM = 0.1;
const FULL_TURN = 2 * Math.PI;

function between(a: Pair, b: Pair): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1]);
}

function positiveAngle(angle: number): number {
  return ((angle % FULL_TURN) + FULL_TURN) % FULL_TURN;
}

function angleFrom(centre: Pair, point: Pair): number {
  return Math.atan2(point[1] - centre[1], point[0] - centre[0]);
}

/** How far an arc turns, radians, always positive; equal ends are a full circle. */
function sweepOf(arc: ScoredArc): number {
  if (between(arc.from, arc.to) < 1e-6) return FULL_TURN;
  const turn = angleFrom(arc.centre, arc.to) - angleFrom(arc.centre, arc.from);
  return positiveAngle(arc.clockwise ? -turn : turn);
}

function radiusOf(arc: ScoredArc): number {
  return (between(arc.from, arc.centre) + between(arc.to, arc.centre)) / 2;
}

function samplesOf(primitive: ScoredPrimitive): readonly Pair[] {
  const length =
    primitive.kind === 'line' ? between(primitive.from, primitive.to) : sweepOf(primitive) * radiusOf(primitive);
  const count = Math.max(1, Math.ceil(length / STEP_MM));
  return Array.from({ length: count }, (_, k): Pair => {
    const share = (k + 0.5) / count;
    if (primitive.kind === 'line') {
      const { from, to } = primitive;
      return [from[0] + (to[0] - from[0]) * share, from[1] + (to[1] - from[1]) * share];
    }
    const angle =
      angleFrom(primitive.centre, primitive.from) + (primitive.clockwise ? -1 : 1) * sweepOf(primitive) * share;
    const radius = radiusOf(primitive);
    return [primitive.centre[0] + radius * Math.cos(angle), primitive.centre[1] + radius * Math.sin(angle)];
  });
}

/** Distance of a point to a line segment or a circular arc itself. */
export function distanceTo(primitive: ScoredPrimitive, point: Pair): number {
  if (primitive.kind === 'line') {
    const { from, to } = primitive;
    const step: Pair = [to[0] - from[0], to[1] - from[1]];
    const squared = step[0] ** 2 + step[1] ** 2 || 1;
    const share = ((point[0] - from[0]) * step[0] + (point[1] - from[1]) * step[1]) / squared;
    const held = Math.min(Math.max(share, 0), 1);
    return between(point, [from[0] + held * step[0], from[1] + held * step[1]]);
  }
  const along = angleFrom(primitive.centre, point) - angleFrom(primitive.centre, primitive.from);
  const isBeside = positiveAngle(primitive.clockwise ? -along : along) <= sweepOf(primitive);
  return isBeside
    ? Math.abs(between(point, primitive.centre) - radiusOf(primitive))
    : Math.min(between(point, primitive.from), between(point, primitive.to));
}

function distanceToAny(primitives: readonly ScoredPrimitive[], point: Pair): number {
  return primitives.reduce(
    (least, primitive) => Math.min(least, distanceTo(primitive, point)),
    Number.POSITIVE_INFINITY,
  );
}

function distances(from: readonly ScoredPrimitive[], to: readonly ScoredPrimitive[]): readonly number[] {
  return from.flatMap((primitive) => samplesOf(primitive).map((point) => distanceToAny(to, point)));
}

function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? Number.NaN;
}

interface Round {
  readonly centre: Pair;
  readonly sizeMm: number;
}

/** Holes and slots as places with a size: a slot's is its width. */
function roundsOf(outline: ScoredOutline): readonly Round[] {
  return [
    ...outline.holes.map(({ centre, diameterMm }) => ({ centre, sizeMm: diameterMm })),
    ...outline.slots.map(({ from, to, widthMm }): Round => {
      return { centre: [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2], sizeMm: widthMm };
    }),
  ];
}

function gapOf(loop: readonly ScoredPrimitive[]): number {
  return loop.reduce((worst, primitive, index) => {
    const next = loop[(index + 1) % loop.length];
    return next ? Math.max(worst, between(primitive.to, next.from)) : worst;
  }, 0);
}

/** Compares outline, cut-outs, holes and slots of a trace with the truth, both ways. */
export function scoreTrace(trace: ScoredTrace, truth: ScoredOutline): TraceScore {
  const tracedCutouts = trace.cutouts.flat();
  const trueCutouts = truth.cutouts.flat();
  const all = [
    ...distances(trace.outer, truth.outer),
    ...distances(truth.outer, trace.outer),
    ...distances(tracedCutouts, trueCutouts),
    ...distances(trueCutouts, tracedCutouts),
  ];
  const tracedRounds = roundsOf(trace);
  const worst = { centre: 0, size: 0 };
  for (const { centre, sizeMm } of roundsOf(truth)) {
    const ordered = [...tracedRounds].sort((a, b) => between(a.centre, centre) - between(b.centre, centre));
    const nearest = ordered[0];
    worst.centre = Math.max(worst.centre, nearest ? between(nearest.centre, centre) : Number.POSITIVE_INFINITY);
    worst.size = Math.max(worst.size, nearest ? Math.abs(nearest.sizeMm - sizeMm) : Number.POSITIVE_INFINITY);
  }
  const halfWidths: number[] = [];
  let inside = 0;
  for (const { primitiveIndex, halfWidthMm } of trace.bands) {
    const primitive = trace.outer[primitiveIndex];
    if (!primitive) continue;
    for (const point of samplesOf(primitive)) {
      halfWidths.push(halfWidthMm);
      if (distanceToAny(truth.outer, point) <= halfWidthMm) inside++;
    }
  }
  return {
    meanMm: all.reduce((sum, value) => sum + value, 0) / all.length,
    p99Mm: quantile(all, 0.99),
    maxMm: Math.max(...all),
    worstCentreMm: worst.centre,
    worstDiameterMm: worst.size,
    insideBand: inside / Math.max(halfWidths.length, 1),
    medianHalfWidthMm: quantile(halfWidths, 0.5),
    worstGapMm: Math.max(gapOf(trace.outer), ...trace.cutouts.map(gapOf)),
  };
}
