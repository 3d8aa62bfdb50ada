import makerjs from 'makerjs';
import type { CutEntity } from '@foldwright/shared/drawing/cut-plan';
import type { Bounds, Point } from '@foldwright/shared/geometry/point';

/** Gap between two ends that still counts as joined, mm. Floating-point noise only: the plan is closed by construction. */
const JOINED_MM = 1e-6;

const pair = (point: Point): [number, number] => [point.x, point.y];

/** A contour of the cut file that would not close on the laser. */
export class OpenContourError extends Error {
  constructor(readonly layer: string) {
    super(`A contour on layer ${layer} does not close`);
    this.name = 'OpenContourError';
  }
}

function contourModel(corners: Extract<CutEntity, { kind: 'contour' }>['corners']): makerjs.IModel {
  const paths: Record<string, makerjs.IPath> = {};
  corners.forEach((corner, index) => {
    const next = corners[(index + 1) % corners.length] ?? corner;
    paths[`p${index}`] =
      corner.bulge === 0
        ? new makerjs.paths.Line(pair(corner.at), pair(next.at))
        : arcPath(corner.at, next.at, corner.bulge);
  });
  return { paths };
}

/** An arc from its ends and bulge; makerjs keeps arcs counter-clockwise, so a clockwise one is turned round. */
function arcPath(from: Point, to: Point, bulge: number): makerjs.IPathArc {
  const chord = { x: to.x - from.x, y: to.y - from.y };
  // Centre from the bulge: the sagitta is bulge * chord / 2, measured to the right of the chord when counter-clockwise.
  const offset = (1 - bulge * bulge) / (4 * bulge);
  const centre = { x: (from.x + to.x) / 2 - chord.y * offset, y: (from.y + to.y) / 2 + chord.x * offset };
  const radius = Math.hypot(from.x - centre.x, from.y - centre.y);
  const angleDeg = (point: Point): number => (Math.atan2(point.y - centre.y, point.x - centre.x) * 180) / Math.PI;
  const [start, end] = bulge > 0 ? [from, to] : [to, from];
  return new makerjs.paths.Arc(pair(centre), radius, angleDeg(start), angleDeg(end));
}

/**
 * Builds the makerjs model of everything that is cut (not the fold lines), one sub-model a contour, and checks that
 * every contour is one endless chain.
 * @throws OpenContourError when a contour does not close within 1e-6 mm.
 */
export function buildCutModel(plan: readonly CutEntity[]): makerjs.IModel {
  const models: Record<string, makerjs.IModel> = {};
  plan.forEach((entity, index) => {
    if (entity.kind === 'line') return;
    if (entity.kind === 'circle') {
      models[`e${index}`] = { paths: { circle: new makerjs.paths.Circle(pair(entity.centre), entity.diameterMm / 2) } };
      return;
    }
    const model = contourModel(entity.corners);
    const chains = makerjs.model.findChains(model, { pointMatchingDistance: JOINED_MM });
    const endless = Array.isArray(chains) && chains.length === 1 && chains[0]?.endless === true;
    if (!endless) throw new OpenContourError(entity.layer);
    models[`e${index}`] = model;
  });
  return { models, units: makerjs.unitType.Millimeter };
}

/** Extents of what is cut, measured by makerjs: a second opinion on the kernel's bounds. */
export function measureCutModel(model: makerjs.IModel): Bounds | null {
  const extents = makerjs.measure.modelExtents(model);
  if (!extents) return null;
  const point = (corner: makerjs.IPoint): Point => ({ x: corner[0] ?? NaN, y: corner[1] ?? NaN });
  return { min: point(extents.low), max: point(extents.high) };
}
