import type { BendDeclaration, Layout } from '../bending/layout';
import type { Point } from '../geometry/point';

/** Flanges of a tray end this far from its corners: room for the thickest starting sheet, 3 mm, and a gap. */
const TRAY_CORNER_MM = 4;
/** Reliefs at its corners reach this far from the outside of base and flange: past the tangent lines of the same sheet. */
const TRAY_RELIEF_MM = 9;
/** A flange goes on above its reliefs when so much of it is left there, mm; else it is as narrow as its bend. */
const LEAST_ABOVE_RELIEF_MM = 6;
/** A gusset keeps this far from the flange it stands against: clear of the bend's radius and of the relief beside it. */
const GUSSET_CLEAR_MM = 12;
/** Both ends of a gusset are cut square by this much, so that the die holds them and nobody is stabbed. */
const GUSSET_TOE_MM = 12;

/** Typed sizes that do not go together, told in words. */
export class StarterError extends RangeError {}

function folded(outer: readonly Point[], bends: readonly (readonly [Point, Point])[], baseAnchor: Point): Layout {
  return {
    outer: { id: 'outer', edges: outer.map((start, index) => ({ id: `e${index + 1}`, start, bulge: 0 })) },
    cutouts: [],
    features: [],
    bends: bends.map(([from, to], index): BendDeclaration => ({
      id: `b${index + 1}`,
      line: { from, to },
      bendAngleDeg: 90,
      direction: 'towards',
      lengths: { from: 'reference', reference: 'outsideApex' },
      insideRadiusMm: null,
      override: null,
      sideEdges: 'trimmed',
    })),
    reliefs: { mode: 'automatic', widthMm: null, depthMm: null, shape: 'obround' },
    baseAnchor,
  };
}

/**
 * A tray of outside sizes: a base with its corner at the origin and a flange on every side. Every corner has a square relief, out of
 * the base and out of both flanges, in which two bends end; above it the flanges nearly meet.
 * @throws StarterError when a side is too short to carry a flange
 */
export function trayLayout(lengthMm: number, widthMm: number, flangeMm: number): Layout {
  const r = TRAY_RELIEF_MM;
  for (const [name, valueMm] of [
    ['length', lengthMm],
    ['width', widthMm],
  ] as const) {
    if (valueMm <= 3 * r)
      throw new StarterError(`A tray’s ${name} of ${valueMm} mm carries no flange; it starts above ${3 * r} mm.`);
  }
  const sides = [
    { start: { x: 0, y: 0 }, along: { x: 1, y: 0 }, sideMm: lengthMm },
    { start: { x: lengthMm, y: 0 }, along: { x: 0, y: 1 }, sideMm: widthMm },
    { start: { x: lengthMm, y: widthMm }, along: { x: -1, y: 0 }, sideMm: lengthMm },
    { start: { x: 0, y: widthMm }, along: { x: 0, y: -1 }, sideMm: widthMm },
  ];
  const outer: Point[] = [];
  const bends: (readonly [Point, Point])[] = [];
  for (const { start, along, sideMm } of sides) {
    const at = (alongMm: number, outMm: number): Point => ({
      x: start.x + along.x * alongMm + along.y * outMm,
      y: start.y + along.y * alongMm - along.x * outMm,
    });
    const [from, to] = [at(r, 0), at(sideMm - r, 0)];
    const left = flangeSide(flangeMm);
    outer.push(at(r, -r), from, ...left.map(([offMm, outMm]) => at(offMm, outMm)));
    outer.push(...[...left].reverse().map(([offMm, outMm]) => at(sideMm - offMm, outMm)), to);
    bends.push([from, to]);
  }
  return folded(outer, bends, { x: lengthMm / 2, y: widthMm / 2 });
}

/** Corners of one side of a flange above its bend line, from the bend up: distance from the tray's corner, and outwards. */
function flangeSide(flangeMm: number): readonly (readonly [number, number])[] {
  const r = TRAY_RELIEF_MM;
  if (flangeMm < r + LEAST_ABOVE_RELIEF_MM) return [[r, flangeMm]];
  return [
    [r, r],
    [TRAY_CORNER_MM, r],
    [TRAY_CORNER_MM, flangeMm],
  ];
}

/**
 * An L of outside sizes with a gusset folded up from the near side of its base, in one sheet: the gusset is a right triangle cut
 * square at its toe and at its top, and stands a little off the flange.
 * @throws StarterError when the gusset does not fit base and flange, or is too small to be held
 */
export function gussetedLayout(sizes: {
  readonly baseMm: number;
  readonly flangeMm: number;
  readonly widthMm: number;
  readonly gussetMm: number;
}): Layout {
  const { baseMm: a, flangeMm: b, widthMm: w, gussetMm: g } = sizes;
  const largest = Math.min(a - GUSSET_CLEAR_MM - 1, b);
  if (g <= GUSSET_TOE_MM || g > largest) {
    throw new StarterError(
      `A gusset of ${g} mm doesn’t fit: on this base and flange it lies between ${GUSSET_TOE_MM} and ${largest} mm.`,
    );
  }
  const near = a - GUSSET_CLEAR_MM;
  const far = near - g;
  const point = (x: number, y: number): Point => ({ x, y });
  const outer = [
    ...[point(0, 0), point(far, 0), point(far, -GUSSET_TOE_MM), point(near - GUSSET_TOE_MM, -g), point(near, -g)],
    ...[point(near, 0), point(a + b, 0), point(a + b, w), point(0, w)],
  ];
  return folded(
    outer,
    [
      [point(a, 0), point(a, w)],
      [point(far, 0), point(near, 0)],
    ],
    point(a / 2, w / 2),
  );
}
