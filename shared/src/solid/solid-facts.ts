import { signedArea } from '../geometry/loop';
import type { Segment } from '../geometry/path';
import { segmentLength, tangentAt } from '../geometry/segment';
import type { CylindricalBend, PlannedLoops, Slab, SolidPlan } from './solid-plan';

/** Volume and surface of a formed part, exact but for the sides of arcs in bends, which are integrated to about 1e-12. */
export interface SolidFacts {
  readonly volumeMm3: number;
  readonly surfaceMm2: number;
}

/**
 * Volume and surface in closed form. A bend's metal is counted where it is after bending: between its radii, not as flat sheet, so that
 * the volume is larger than area times thickness by 0.5 - K of each zone's own share; mass comes from the flat pattern.
 */
export function solidFacts({ thicknessMm, pieces }: SolidPlan): SolidFacts {
  let volumeMm3 = 0;
  let surfaceMm2 = 0;
  for (const piece of pieces) {
    const facts = piece.kind === 'slab' ? slabFacts(piece, thicknessMm) : bendFacts(piece, thicknessMm);
    volumeMm3 += facts.volumeMm3;
    surfaceMm2 += facts.surfaceMm2;
  }
  return { volumeMm3, surfaceMm2 };
}

function areaOf(loops: PlannedLoops): number {
  return loops.reduce((sum, loop) => sum + signedArea(loop.map(({ segment }) => segment)), 0);
}

function freeEdges(loops: PlannedLoops): readonly Segment[] {
  return loops.flatMap((loop) => loop.flatMap(({ segment, isSeam }) => (isSeam ? [] : [segment])));
}

function slabFacts({ loops }: Slab, thicknessMm: number): SolidFacts {
  const area = areaOf(loops);
  const rim = freeEdges(loops).reduce((sum, segment) => sum + segmentLength(segment), 0);
  return { volumeMm3: area * thicknessMm, surfaceMm2: 2 * area + rim * thicknessMm };
}

function bendFacts({ loops, radPerMm, insideRadiusMm }: CylindricalBend, thicknessMm: number): SolidFacts {
  const area = areaOf(loops);
  const outsideRadiusMm = insideRadiusMm + thicknessMm;
  // An element of the unrolled zone, dx by dy, is dx by radPerMm * dy * r on the cylinder of radius r.
  const volumeMm3 = (area * radPerMm * (outsideRadiusMm ** 2 - insideRadiusMm ** 2)) / 2;
  const faces = area * radPerMm * (insideRadiusMm + outsideRadiusMm);
  const sides = freeEdges(loops).reduce(
    (sum, segment) => sum + sideArea(segment, radPerMm, insideRadiusMm, outsideRadiusMm),
    0,
  );
  return { volumeMm3, surfaceMm2: faces + sides };
}

/** Points and weights of Gauss and Legendre on -1..1, sixteen of them, positive half. Source: Abramowitz and Stegun, table 25.4. */
const GAUSS: readonly (readonly [number, number])[] = [
  [0.0950125098376374, 0.1894506104550685],
  [0.2816035507792589, 0.1826034150449236],
  [0.4580167776572274, 0.1691565193950025],
  [0.6178762444026438, 0.1495959888165767],
  [0.755404408355003, 0.1246289712555339],
  [0.8656312023878318, 0.0951585116824928],
  [0.9445750230732326, 0.0622535239386479],
  [0.9894009349916499, 0.0271524594117541],
];
/** An arc is integrated in this many stretches. */
const STRETCHES = 8;

/** Area swept by an edge of the unrolled zone between the two radii: a ring's sector, a plane strip, or a helicoid. */
function sideArea(segment: Segment, radPerMm: number, insideRadiusMm: number, outsideRadiusMm: number): number {
  const length = segmentLength(segment);
  /** Area of the strip per mm of edge that runs in a direction. */
  const strip = (direction: { readonly x: number; readonly y: number }): number =>
    Math.abs(
      primitive(direction.x, direction.y * radPerMm, outsideRadiusMm) -
        primitive(direction.x, direction.y * radPerMm, insideRadiusMm),
    );
  if (segment.kind === 'line') {
    const { from, to } = segment;
    return length * strip({ x: (to.x - from.x) / length, y: (to.y - from.y) / length });
  }
  let sum = 0;
  for (let stretch = 0; stretch < STRETCHES; stretch += 1) {
    for (const [at, weight] of GAUSS) {
      for (const side of [-1, 1]) {
        const t = (stretch + 0.5 + (side * at) / 2) / STRETCHES;
        const way = tangentAt(segment, t);
        const size = Math.hypot(way.x, way.y);
        sum += (weight / (2 * STRETCHES)) * strip({ x: way.x / size, y: way.y / size });
      }
    }
  }
  return length * sum;
}

/** Primitive in r of sqrt(along^2 + (turn r)^2). */
function primitive(along: number, turn: number, r: number): number {
  if (Math.abs(turn) < 1e-15) return Math.abs(along) * r;
  const slant = Math.hypot(along, turn * r);
  if (along === 0) return (Math.abs(turn) * r * r) / 2;
  return (r * slant + ((along * along) / Math.abs(turn)) * Math.asinh((Math.abs(turn) * r) / Math.abs(along))) / 2;
}
