import type { BendDeclaration, Layout } from '../bending/layout';
import type { Point } from '../geometry/point';

/** Flanges of a tray end this far from its corners: room for the thickest starting sheet, 3 mm, and a gap. */
const TRAY_CORNER_MM = 4;
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
 * A tray of outside sizes: a base with its corner at the origin and a flange on every side, reliefs at their ends.
 * @throws StarterError when a side is too short to carry a flange
 */
export function trayLayout(lengthMm: number, widthMm: number, flangeMm: number): Layout {
  const c = TRAY_CORNER_MM;
  for (const [name, valueMm] of [
    ['length', lengthMm],
    ['width', widthMm],
  ] as const) {
    if (valueMm <= 3 * c)
      throw new StarterError(`A tray’s ${name} of ${valueMm} mm carries no flange; it starts above ${3 * c} mm.`);
  }
  const [l, w, f] = [lengthMm, widthMm, flangeMm];
  const point = (x: number, y: number): Point => ({ x, y });
  const outer = [
    ...[point(0, 0), point(c, 0), point(c, -f), point(l - c, -f), point(l - c, 0)],
    ...[point(l, 0), point(l, c), point(l + f, c), point(l + f, w - c), point(l, w - c)],
    ...[point(l, w), point(l - c, w), point(l - c, w + f), point(c, w + f), point(c, w)],
    ...[point(0, w), point(0, w - c), point(-f, w - c), point(-f, c), point(0, c)],
  ];
  const bends = [
    [point(c, 0), point(l - c, 0)],
    [point(l, c), point(l, w - c)],
    [point(l - c, w), point(c, w)],
    [point(0, w - c), point(0, c)],
  ] as const;
  return folded(outer, bends, point(l / 2, w / 2));
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
