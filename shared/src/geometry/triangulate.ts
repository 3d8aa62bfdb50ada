import earcut from 'earcut';
import type { Point } from './point';
import { ON_EDGE_MM } from './tolerance';

/**
 * Triangles of a polygon with openings, as triples of indices into all points in the order given (outer first).
 * Every edge of the polygon is an edge of a triangle, also where several edges lie on one line, so that neighbours meet it
 * corner to corner.
 * @param outer corners counter-clockwise.
 * @param openings corners of each opening, clockwise.
 * @returns counter-clockwise triangles.
 */
export function triangulate(outer: readonly Point[], openings: readonly (readonly Point[])[]): readonly number[] {
  const loops = [outer, ...openings];
  const points = loops.flat();
  const starts: number[] = [];
  const nextOf: number[] = [];
  let count = 0;
  for (const loop of loops) {
    const first = count;
    if (count > 0) starts.push(count);
    loop.forEach((_, index) => nextOf.push(first + ((index + 1) % loop.length)));
    count += loop.length;
  }
  const found = earcut(
    points.flatMap((point) => [point.x, point.y]),
    starts,
  );
  return splitAtCorners(counterClockwise(found, points), nextOf, points);
}

/** The library keeps one sense for all triangles, which depends on its version and the input. */
function counterClockwise(triangles: readonly number[], points: readonly Point[]): readonly number[] {
  let doubled = 0;
  for (let at = 0; at + 2 < triangles.length; at += 3) {
    const [a, b, c] = [points[triangles[at] ?? 0], points[triangles[at + 1] ?? 0], points[triangles[at + 2] ?? 0]];
    if (a !== undefined && b !== undefined && c !== undefined) {
      doubled += (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
    }
  }
  if (doubled >= 0) return triangles;
  const turned: number[] = [];
  for (let at = 0; at + 2 < triangles.length; at += 3) {
    turned.push(triangles[at] ?? 0, triangles[at + 2] ?? 0, triangles[at + 1] ?? 0);
  }
  return turned;
}

/**
 * The library leaves out corners on straight runs, along the polygon and along its own bridges to openings. An edge that has no
 * neighbour and is no edge of the polygon stands for such a run: its triangle is split into a fan over the corners left out.
 */
function splitAtCorners(
  triangles: readonly number[],
  nextOf: readonly number[],
  points: readonly Point[],
): readonly number[] {
  const travelled = new Set<number>();
  const keyOf = (from: number, to: number): number => from * points.length + to;
  for (let at = 0; at + 2 < triangles.length; at += 3) {
    for (let side = 0; side < 3; side += 1) {
      travelled.add(keyOf(triangles[at + side] ?? 0, triangles[at + ((side + 1) % 3)] ?? 0));
    }
  }
  const between = (from: number, to: number): readonly number[] =>
    nextOf[from] === to || travelled.has(keyOf(to, from)) ? [] : cornersBetween(from, to, points);
  const split: number[] = [];
  for (let at = 0; at + 2 < triangles.length; at += 3) {
    const [a, b, c] = [triangles[at] ?? 0, triangles[at + 1] ?? 0, triangles[at + 2] ?? 0];
    split.push(...splitTriangle([a, b, c], [between(a, b), between(b, c), between(c, a)]));
  }
  return split;
}

/** Corners on the straight way from one to another, in order, each place once. */
function cornersBetween(from: number, to: number, points: readonly Point[]): readonly number[] {
  const [start, end] = [points[from], points[to]];
  if (start === undefined || end === undefined) return [];
  const way = { x: end.x - start.x, y: end.y - start.y };
  const length = Math.sqrt(way.x * way.x + way.y * way.y);
  const found: { readonly index: number; readonly at: number }[] = [];
  points.forEach((point, index) => {
    const off = { x: point.x - start.x, y: point.y - start.y };
    const at = (off.x * way.x + off.y * way.y) / length;
    if (at <= ON_EDGE_MM || at >= length - ON_EDGE_MM) return;
    if (Math.abs(off.x * way.y - off.y * way.x) <= ON_EDGE_MM * length) found.push({ index, at });
  });
  found.sort((a, b) => a.at - b.at);
  return found
    .filter(({ at }, place) => place === 0 || at - (found[place - 1]?.at ?? 0) > ON_EDGE_MM)
    .map(({ index }) => index);
}

type Three<T> = readonly [T, T, T];

/** Triangles over one triangle with extra corners on its sides: `extras[0]` lie between the first and the second corner, and so on. */
function splitTriangle(corners: Three<number>, extras: Three<readonly number[]>): readonly number[] {
  const [a, b, c] = corners;
  const [onAb, onBc, onCa] = extras;
  const first = onAb[0];
  const last = onAb.at(-1);
  if (first === undefined || last === undefined) {
    if (onBc.length === 0 && onCa.length === 0) return corners;
    return splitTriangle([b, c, a], [onBc, onCa, onAb]);
  }
  const middle = onAb.slice(1).flatMap((point, index) => [onAb[index] ?? first, point, c]);
  return [...splitTriangle([a, first, c], [[], [], onCa]), ...middle, ...splitTriangle([last, b, c], [[], onBc, []])];
}
