import earcut from 'earcut';
import type { Point } from './point';

/**
 * Triangles of a polygon with openings, as triples of indices into all points in the order given (outer first).
 * Triangles run counter-clockwise when the outer polygon does.
 */
export function triangulate(outer: readonly Point[], openings: readonly (readonly Point[])[]): readonly number[] {
  const points = [outer, ...openings].flat();
  const starts: number[] = [];
  let count = outer.length;
  for (const opening of openings) {
    starts.push(count);
    count += opening.length;
  }
  const triangles = earcut(
    points.flatMap((point) => [point.x, point.y]),
    starts,
  );
  const first = triangleArea(points, triangles, 0);
  if (first >= 0) return triangles;
  const turned: number[] = [];
  for (let index = 0; index + 2 < triangles.length; index += 3) {
    turned.push(triangles[index] ?? 0, triangles[index + 2] ?? 0, triangles[index + 1] ?? 0);
  }
  return turned;
}

function triangleArea(points: readonly Point[], triangles: readonly number[], at: number): number {
  const a = points[triangles[at] ?? 0];
  const b = points[triangles[at + 1] ?? 0];
  const c = points[triangles[at + 2] ?? 0];
  if (a === undefined || b === undefined || c === undefined) return 0;
  return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
}
