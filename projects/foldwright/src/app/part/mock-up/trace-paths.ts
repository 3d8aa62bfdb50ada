import type { Trace, TracePoint, TracePrimitive } from '@foldwright/shared/fitting/trace';

/** How far the photo's edge lies off the fitted line, in the three steps the board shows. */
export type ResidualStep = 'near' | 'some' | 'far';

/** Limits between the steps, mm. */
const SOME_FROM_MM = 0.1;
const FAR_FROM_MM = 0.2;

export interface OutlineStretch {
  readonly index: number;
  /** SVG path, mm, y down from the sheet's upper edge. */
  readonly d: string;
  readonly step: ResidualStep;
  readonly residualMm: number;
  readonly halfWidthMm: number;
  readonly middle: readonly [number, number];
}

export interface TracePaths {
  readonly stretches: readonly OutlineStretch[];
  /** The whole outline as one closed path. */
  readonly outline: string;
  readonly cutouts: readonly string[];
  readonly holes: readonly { readonly x: number; readonly y: number; readonly radius: number }[];
  readonly slots: readonly string[];
}

export function residualStep(residualMm: number): ResidualStep {
  if (residualMm < SOME_FROM_MM) return 'near';
  return residualMm < FAR_FROM_MM ? 'some' : 'far';
}

/** Everything the board draws of a trace. Traces count y up from the sheet's lower edge, pictures down from the upper. */
export function tracePaths(trace: Trace, sheetHeightMm: number): TracePaths {
  const down = ([x, y]: TracePoint): [number, number] => [x, sheetHeightMm - y];
  const move = (point: TracePoint): string => `M${down(point).join(' ')}`;
  const run = (primitive: TracePrimitive): string => {
    const to = down(primitive.to).join(' ');
    if (primitive.kind === 'line') return `L${to}`;
    const { radius, isLarge } = arcShape(primitive);
    // Turning y over changes the numbers, not the picture: clockwise stays clockwise, which SVG calls sweep 1.
    return `A${radius} ${radius} 0 ${isLarge ? 1 : 0} ${primitive.clockwise ? 1 : 0} ${to}`;
  };
  const closed = (primitives: readonly TracePrimitive[]): string => {
    const first = primitives[0];
    return first === undefined ? '' : `${move(first.from)}${primitives.map(run).join('')}Z`;
  };
  const bands = new Map(trace.bands.map((band) => [band.primitiveIndex, band]));
  return {
    outline: closed(trace.outer),
    cutouts: trace.cutouts.map(closed),
    holes: trace.holes.map(({ centre, diameterMm }) => {
      const [x, y] = down(centre);
      return { x, y, radius: diameterMm / 2 };
    }),
    slots: trace.slots.map(({ from, to, widthMm }) => obround(down(from), down(to), widthMm / 2)),
    stretches: trace.outer.map((primitive, index) => {
      const band = bands.get(index);
      const residualMm = band?.residualMm ?? 0;
      return {
        index,
        d: `${move(primitive.from)}${run(primitive)}`,
        step: residualStep(residualMm),
        residualMm,
        halfWidthMm: band?.halfWidthMm ?? trace.uncertaintyMm,
        middle: down(middleOf(primitive)),
      };
    }),
  };
}

/** The stretch where the edge lies furthest off, to look at first; null for an empty trace. */
export function worstStretch(paths: TracePaths): OutlineStretch | null {
  return paths.stretches.reduce<OutlineStretch | null>(
    (worst, stretch) => (worst === null || stretch.residualMm > worst.residualMm ? stretch : worst),
    null,
  );
}

type TraceArc = Extract<TracePrimitive, { kind: 'arc' }>;

function sweepOf({ from, to, centre, clockwise }: TraceArc): number {
  const start = Math.atan2(from[1] - centre[1], from[0] - centre[0]);
  const end = Math.atan2(to[1] - centre[1], to[0] - centre[0]);
  const turn = clockwise ? start - end : end - start;
  return ((turn % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI);
}

function arcShape(arc: TraceArc): { readonly radius: number; readonly isLarge: boolean } {
  return {
    radius: Math.hypot(arc.from[0] - arc.centre[0], arc.from[1] - arc.centre[1]),
    isLarge: sweepOf(arc) > Math.PI,
  };
}

function middleOf(primitive: TracePrimitive): TracePoint {
  const { from, to } = primitive;
  if (primitive.kind === 'line') return [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
  const { radius } = arcShape(primitive);
  const start = Math.atan2(from[1] - primitive.centre[1], from[0] - primitive.centre[0]);
  const half = start + ((primitive.clockwise ? -1 : 1) * sweepOf(primitive)) / 2;
  return [primitive.centre[0] + radius * Math.cos(half), primitive.centre[1] + radius * Math.sin(half)];
}

function obround(from: readonly [number, number], to: readonly [number, number], radius: number): string {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
  const side = [(-(to[1] - from[1]) / length) * radius, ((to[0] - from[0]) / length) * radius] as const;
  const at = (point: readonly [number, number], sign: 1 | -1): string =>
    `${point[0] + sign * side[0]} ${point[1] + sign * side[1]}`;
  const round = `A${radius} ${radius} 0 0 1`;
  return `M${at(from, -1)}L${at(to, -1)}${round} ${at(to, 1)}L${at(from, 1)}${round} ${at(from, -1)}Z`;
}
