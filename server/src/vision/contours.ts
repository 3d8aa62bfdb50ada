import type { Point } from '@foldwright/shared/geometry/point';
import { boxMean } from './mask-shapes';
import type { PageRaster } from './rectify';

/** A closed chain of page points, mm, the template on its left: counter-clockwise outside, clockwise round openings. */
export type Contour = readonly Point[];

const TOP = 0;
const RIGHT = 1;
const BOTTOM = 2;
const LEFT = 3;

/** Ways through a square of four cells, from side to side, by its corners: top left 8, top right 4, bottom right 2, bottom left 1. */
const WAYS: readonly (readonly (readonly [number, number])[])[] = [
  [],
  [[BOTTOM, LEFT]],
  [[RIGHT, BOTTOM]],
  [[RIGHT, LEFT]],
  [[TOP, RIGHT]],
  [
    [TOP, RIGHT],
    [BOTTOM, LEFT],
  ],
  [[TOP, BOTTOM]],
  [[TOP, LEFT]],
  [[LEFT, TOP]],
  [[BOTTOM, TOP]],
  [
    [LEFT, TOP],
    [RIGHT, BOTTOM],
  ],
  [[RIGHT, TOP]],
  [[LEFT, RIGHT]],
  [[BOTTOM, RIGHT]],
  [[LEFT, BOTTOM]],
  [],
];

/**
 * Outlines of a mask by marching squares on its slightly smoothed edge (Lorensen and Cline 1987, in the plane).
 * Longest first.
 */
export function traceContours(mask: Uint8Array, raster: PageRaster): readonly Contour[] {
  const { columns, rows, perMm, heightMm } = raster;
  const soft = boxMean(new Float32Array(mask), columns, rows, 1);
  // A side is named by its left or upper cell, twice, plus one when it runs down.
  const nextSide = new Map<number, number>();
  const sideOf = (column: number, row: number, side: number): number => {
    const cell = row * columns + column;
    if (side === TOP) return cell * 2;
    if (side === BOTTOM) return (cell + columns) * 2;
    return side === LEFT ? cell * 2 + 1 : (cell + 1) * 2 + 1;
  };
  for (let row = 0; row + 1 < rows; row++) {
    for (let column = 0; column + 1 < columns; column++) {
      const cell = row * columns + column;
      const code =
        ((soft[cell] ?? 0) > 0.5 ? 8 : 0) +
        ((soft[cell + 1] ?? 0) > 0.5 ? 4 : 0) +
        ((soft[cell + columns + 1] ?? 0) > 0.5 ? 2 : 0) +
        ((soft[cell + columns] ?? 0) > 0.5 ? 1 : 0);
      if (code === 0 || code === 15) continue;
      for (const [from, to] of WAYS[code] ?? []) nextSide.set(sideOf(column, row, from), sideOf(column, row, to));
    }
  }
  const place = (side: number): Point => {
    const cell = side >> 1;
    const other = cell + (side % 2 === 1 ? columns : 1);
    const a = soft[cell] ?? 0;
    const b = soft[other] ?? 0;
    const share = a === b ? 0.5 : (0.5 - a) / (b - a);
    const column = (cell % columns) + (side % 2 === 1 ? 0 : share);
    const row = Math.floor(cell / columns) + (side % 2 === 1 ? share : 0);
    return { x: (column + 0.5) / perMm, y: heightMm - (row + 0.5) / perMm };
  };
  const contours: Point[][] = [];
  for (const start of [...nextSide.keys()]) {
    const contour: Point[] = [];
    for (let side: number | undefined = start; side !== undefined;) {
      const next: number | undefined = nextSide.get(side);
      if (next === undefined) break;
      nextSide.delete(side);
      contour.push(place(side));
      side = next;
    }
    if (contour.length >= 12) contours.push(contour);
  }
  return contours.sort((a, b) => b.length - a.length);
}

/** The chain again with points `stepMm` apart or a little less, evenly spread round it. */
export function resample(contour: Contour, stepMm: number): Contour {
  const lengths = [0];
  contour.forEach((point, index) => {
    const next = contour[(index + 1) % contour.length] ?? point;
    lengths.push((lengths[index] ?? 0) + Math.hypot(next.x - point.x, next.y - point.y));
  });
  const total = lengths[contour.length] ?? 0;
  const count = Math.max(8, Math.ceil(total / stepMm));
  const result: Point[] = [];
  let segment = 0;
  for (let k = 0; k < count; k++) {
    const at = (total * k) / count;
    while (segment + 1 < contour.length && (lengths[segment + 1] ?? 0) <= at) segment++;
    const a = contour[segment] ?? { x: 0, y: 0 };
    const b = contour[(segment + 1) % contour.length] ?? a;
    const span = (lengths[segment + 1] ?? 0) - (lengths[segment] ?? 0) || 1;
    const share = (at - (lengths[segment] ?? 0)) / span;
    result.push({ x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share });
  }
  return result;
}

/** Each point replaced by a weighted mean of its neighbours within `reach` places. */
export function smoothContour(contour: Contour, reach: number): Contour {
  return contour.map((_, index) => {
    let x = 0;
    let y = 0;
    let sum = 0;
    for (let k = -reach; k <= reach; k++) {
      const point = contour[(index + k + contour.length * (reach + 1)) % contour.length];
      if (!point) continue;
      const weight = reach + 1 - Math.abs(k);
      x += weight * point.x;
      y += weight * point.y;
      sum += weight;
    }
    return { x: x / sum, y: y / sum };
  });
}

/** Unit normal at each point, away from the template: to the right of the way. */
export function outwardNormals(contour: Contour, reach: number): readonly Point[] {
  return contour.map((_, index) => {
    const before = contour[(index - reach + contour.length * (reach + 1)) % contour.length] ?? { x: 0, y: 0 };
    const after = contour[(index + reach) % contour.length] ?? { x: 1, y: 0 };
    const length = Math.hypot(after.x - before.x, after.y - before.y) || 1;
    return { x: (after.y - before.y) / length, y: -(after.x - before.x) / length };
  });
}
