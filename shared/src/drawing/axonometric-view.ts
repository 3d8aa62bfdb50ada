import type { Mesh } from '../bending/development';
import type { Bounds, Point } from '../geometry/point';

/** Where one looks from: azimuth counter-clockwise from +x seen from above, elevation above the base panel. */
export interface ViewDirection {
  readonly azimuthDeg: number;
  readonly elevationDeg: number;
}

/** From the front right, a little above: the direction all lists and drawings use, so that parts can be compared. */
export const USUAL_VIEW: ViewDirection = { azimuthDeg: -62, elevationDeg: 36 };

export type AxonometricItem =
  | { readonly kind: 'face'; readonly corners: readonly [Point, Point, Point]; readonly brightness: number }
  | { readonly kind: 'edge'; readonly from: Point; readonly to: Point };

/** A parallel projection ready to be painted in order: what is far comes first. */
export interface AxonometricView {
  readonly items: readonly AxonometricItem[];
  /** Null for an empty mesh. */
  readonly bounds: Bounds | null;
}

interface Projected extends Point {
  /** Distance towards the viewer, mm. */
  readonly depth: number;
}

type Triple = readonly [number, number, number];

/** Light from above left of the viewer; chosen by eye so that base, flanges and rims differ. */
const LIGHT: Triple = normalised([-0.45, -0.35, 0.82]);
/** An edge lies on the faces it borders: it is drawn just after them. */
const EDGE_LIFT_MM = 0.6;

function normalised([x, y, z]: Triple): Triple {
  const length = Math.hypot(x, y, z) || 1;
  return [x / length, y / length, z / length];
}

const dot = (a: Triple, b: Triple): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

function axesOf(view: ViewDirection): { readonly right: Triple; readonly up: Triple; readonly towards: Triple } {
  const azimuth = (view.azimuthDeg * Math.PI) / 180;
  const elevation = (view.elevationDeg * Math.PI) / 180;
  return {
    right: [-Math.sin(azimuth), Math.cos(azimuth), 0],
    up: [-Math.sin(elevation) * Math.cos(azimuth), -Math.sin(elevation) * Math.sin(azimuth), Math.cos(elevation)],
    towards: [Math.cos(elevation) * Math.cos(azimuth), Math.cos(elevation) * Math.sin(azimuth), Math.sin(elevation)],
  };
}

const tripleAt = (values: readonly number[], index: number): Triple => [
  values[3 * index] ?? 0,
  values[3 * index + 1] ?? 0,
  values[3 * index + 2] ?? 0,
];

/**
 * Projects a mesh along a direction, drops the faces that look away, and sorts the rest with their edges from far to
 * near (by the middle of each; exact for the convex pieces that a formed sheet is made of, good enough between them).
 * Result in mm of the picture plane, y up.
 */
export function projectMesh(mesh: Mesh, view: ViewDirection = USUAL_VIEW): AxonometricView {
  const { right, up, towards } = axesOf(view);
  const project = (point: Triple): Projected => ({
    x: dot(point, right),
    y: dot(point, up),
    depth: dot(point, towards),
  });
  const sorted: { readonly depth: number; readonly item: AxonometricItem }[] = [];
  const seen: Point[] = [];
  for (let index = 0; index + 2 < mesh.indices.length; index += 3) {
    const corners = [0, 1, 2].map((step) => mesh.indices[index + step] ?? 0);
    const [a, b, c] = corners.map((corner) => project(tripleAt(mesh.positions, corner)));
    if (!a || !b || !c) continue;
    const turnsLeft = (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
    if (turnsLeft <= 0) continue;
    const normal = normalised(tripleAt(mesh.normals, corners[0] ?? 0));
    const brightness = 0.45 + 0.55 * Math.max(0, dot(normal, LIGHT));
    seen.push(a, b, c);
    sorted.push({ depth: (a.depth + b.depth + c.depth) / 3, item: { kind: 'face', corners: [a, b, c], brightness } });
  }
  for (let index = 0; index + 5 < mesh.edges.length; index += 6) {
    const from = project(tripleAt(mesh.edges, index / 3));
    const to = project(tripleAt(mesh.edges, index / 3 + 1));
    sorted.push({ depth: (from.depth + to.depth) / 2 + EDGE_LIFT_MM, item: { kind: 'edge', from, to } });
  }
  sorted.sort((first, second) => first.depth - second.depth);
  return { items: sorted.map((entry) => entry.item), bounds: boundsOf(seen) };
}

function boundsOf(points: readonly Point[]): Bounds | null {
  const first = points[0];
  if (!first) return null;
  return points.reduce<Bounds>(
    (bounds, point) => ({
      min: { x: Math.min(bounds.min.x, point.x), y: Math.min(bounds.min.y, point.y) },
      max: { x: Math.max(bounds.max.x, point.x), y: Math.max(bounds.max.y, point.y) },
    }),
    { min: first, max: first },
  );
}
