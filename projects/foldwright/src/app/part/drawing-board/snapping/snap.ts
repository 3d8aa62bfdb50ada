import type { Segment } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { nearestOnSegment } from '@foldwright/shared/geometry/segment';
import { along, cross, distance, dot, subtract, turnLeft, unit } from '@foldwright/shared/geometry/vector';

/** What a point was drawn to. */
export type SnapKind =
  'none' | 'endpoint' | 'intersection' | 'midpoint' | 'centre' | 'on-edge' | 'alignment' | 'perpendicular' | 'grid';

/** Words for the label beside the pointer: a snap that cannot be seen is a wrong dimension. */
export const SNAP_WORDS: Readonly<Record<SnapKind, string>> = {
  none: '',
  endpoint: 'corner',
  intersection: 'crossing',
  midpoint: 'middle',
  centre: 'centre',
  'on-edge': 'on the edge',
  alignment: 'in line',
  perpendicular: 'square',
  grid: 'whole mm',
};

export interface SnapPoint {
  readonly kind: 'endpoint' | 'intersection' | 'midpoint' | 'centre';
  readonly point: Point;
}

/** A line that a dragged point likes to lie on, drawn from `through`. `direction` is a unit vector. */
export interface SnapRay {
  readonly kind: 'alignment' | 'perpendicular';
  readonly through: Point;
  readonly direction: Point;
}

export interface SnapCandidates {
  readonly points: readonly SnapPoint[];
  readonly edges: readonly Segment[];
  /** Besides the level and plumb lines through every point. */
  readonly rays: readonly SnapRay[];
}

export interface SnapOptions {
  /** How near counts, mm. */
  readonly toleranceMm: number;
  /** Spacing of the grid, mm; null = none. */
  readonly gridMm: number | null;
  /** Ctrl: nothing draws the point. */
  readonly isSuspended: boolean;
  /** Shift: stay level or plumb with this point, whichever is nearer. */
  readonly lockFrom: Point | null;
}

/** A thin line to draw from what was snapped to. */
export interface SnapGuide {
  readonly from: Point;
  readonly to: Point;
}

export interface SnapResult {
  readonly point: Point;
  readonly kind: SnapKind;
  readonly guides: readonly SnapGuide[];
}

const LEVEL: Point = { x: 1, y: 0 };
const PLUMB: Point = { x: 0, y: 1 };

/**
 * Draws a point to what is near: first to points, then to where two guides cross, to edges, to one guide, to the grid.
 * @param at the pointer, mm
 * @returns where the point goes and why; the same point with kind `none` when nothing is near
 */
export function snap(at: Point, candidates: SnapCandidates, options: SnapOptions): SnapResult {
  if (options.lockFrom !== null) return snapLocked(at, candidates, options, options.lockFrom);
  if (options.isSuspended) return free(at);
  return (
    snapToPoint(at, candidates.points, options.toleranceMm) ??
    snapToRays(at, candidates, options) ??
    snapToEdge(at, candidates.edges, options.toleranceMm) ??
    snapToGrid(at, options) ??
    free(at)
  );
}

function free(point: Point): SnapResult {
  return { point, kind: 'none', guides: [] };
}

function snapToPoint(at: Point, points: readonly SnapPoint[], toleranceMm: number): SnapResult | null {
  let best: SnapPoint | null = null;
  let bestMm = toleranceMm;
  for (const candidate of points) {
    const away = distance(candidate.point, at);
    if (away < bestMm || (away === bestMm && best === null)) [best, bestMm] = [candidate, away];
  }
  return best === null ? null : { point: best.point, kind: best.kind, guides: [] };
}

/** Level, plumb and square lines; two of them that cross nearby hold the point in both directions. */
function snapToRays(at: Point, candidates: SnapCandidates, options: SnapOptions): SnapResult | null {
  const rays: SnapRay[] = [...candidates.rays];
  for (const { kind, point } of candidates.points) {
    if (kind === 'midpoint') continue;
    rays.push(
      { kind: 'alignment', through: point, direction: LEVEL },
      { kind: 'alignment', through: point, direction: PLUMB },
    );
  }
  const near = rays
    .map((ray) => ({ ray, away: Math.abs(cross(ray.direction, subtract(at, ray.through))) }))
    .filter(({ away }) => away <= options.toleranceMm)
    .sort((a, b) => a.away - b.away || distance(a.ray.through, at) - distance(b.ray.through, at));
  const first = near[0]?.ray;
  if (first === undefined) return null;
  for (const { ray } of near.slice(1)) {
    const meeting = meet(first, ray);
    if (meeting !== null && distance(meeting, at) <= 1.5 * options.toleranceMm) {
      const kind = first.kind === 'perpendicular' || ray.kind === 'perpendicular' ? 'perpendicular' : 'alignment';
      return { point: meeting, kind, guides: [guide(first, meeting), guide(ray, meeting)] };
    }
  }
  const onEdge = snapToEdge(at, candidates.edges, options.toleranceMm);
  if (onEdge !== null) return onEdge;
  const foot = along(first.through, first.direction, dot(subtract(at, first.through), first.direction));
  const point = isAxis(first.direction) ? gridAlong(foot, first.direction, options.gridMm) : foot;
  return { point, kind: first.kind, guides: [guide(first, point)] };
}

function snapToEdge(at: Point, edges: readonly Segment[], toleranceMm: number): SnapResult | null {
  let best: SnapResult | null = null;
  let bestMm = toleranceMm;
  for (const edge of edges) {
    const nearest = nearestOnSegment(edge, at);
    if (nearest.distanceMm < bestMm) {
      bestMm = nearest.distanceMm;
      best = { point: nearest.point, kind: 'on-edge', guides: [] };
    }
  }
  return best;
}

function snapToGrid(at: Point, { gridMm }: SnapOptions): SnapResult | null {
  if (gridMm === null) return null;
  return { point: { x: roundTo(at.x, gridMm), y: roundTo(at.y, gridMm) }, kind: 'grid', guides: [] };
}

/** Level or plumb with a point; along that line whatever else is near still holds. */
function snapLocked(at: Point, candidates: SnapCandidates, options: SnapOptions, from: Point): SnapResult {
  const isLevel = Math.abs(at.x - from.x) >= Math.abs(at.y - from.y);
  const direction = isLevel ? LEVEL : PLUMB;
  const foot = isLevel ? { x: at.x, y: from.y } : { x: from.x, y: at.y };
  const axisGuide = (point: Point): SnapGuide => ({ from, to: point });
  if (options.isSuspended) return { point: foot, kind: 'alignment', guides: [axisGuide(foot)] };
  let best: Point | null = null;
  let bestMm = options.toleranceMm;
  let source: Point | null = null;
  for (const { kind, point } of candidates.points) {
    if (kind === 'midpoint') continue;
    const candidate = isLevel ? { x: point.x, y: from.y } : { x: from.x, y: point.y };
    const away = distance(candidate, foot);
    if (away < bestMm) [best, bestMm, source] = [candidate, away, point];
  }
  const point = best ?? gridAlong(foot, direction, options.gridMm);
  const guides = source === null ? [axisGuide(point)] : [axisGuide(point), { from: source, to: point }];
  return { point, kind: 'alignment', guides };
}

function guide(ray: SnapRay, to: Point): SnapGuide {
  return { from: ray.through, to };
}

function meet(a: SnapRay, b: SnapRay): Point | null {
  const sine = cross(a.direction, b.direction);
  // Guides closer than half a degree to parallel cross too far away to be meant.
  if (Math.abs(sine) < 0.01) return null;
  return along(a.through, a.direction, cross(subtract(b.through, a.through), b.direction) / sine);
}

function isAxis(direction: Point): boolean {
  return direction.x === 0 || direction.y === 0;
}

function gridAlong(point: Point, direction: Point, gridMm: number | null): Point {
  if (gridMm === null) return point;
  return direction.y === 0 ? { x: roundTo(point.x, gridMm), y: point.y } : { x: point.x, y: roundTo(point.y, gridMm) };
}

function roundTo(value: number, stepMm: number): number {
  const rounded = Math.round(value / stepMm) * stepMm;
  // Steps of 0.1 or 0.5 leave binary dust behind.
  return Math.round(rounded * 1e6) / 1e6;
}

/** The two lines through a corner that make its new edge square to, or run on from, a neighbouring edge. */
export function squareRays(corner: Point, neighbour: Point): readonly SnapRay[] {
  if (distance(corner, neighbour) === 0) return [];
  const direction = unit(subtract(corner, neighbour));
  return [
    { kind: 'perpendicular', through: corner, direction: turnLeft(direction) },
    { kind: 'alignment', through: corner, direction },
  ];
}
