import type { GreyPicture } from './picture';

/** A place in a picture, pixels, y down. */
export interface PixelPoint {
  readonly x: number;
  readonly y: number;
}

/** Four corners, clockwise as seen. */
export type Quad = readonly [PixelPoint, PixelPoint, PixelPoint, PixelPoint];

const MIN_SIDE_PX = 11;
const MAX_SIDE_SHARE = 0.2;
/** Half the window of the local mean, as a share of the long side. */
const WINDOW_SHARE = 1 / 45;
const DARKER_BY_SHARE = 0.16;
const DARKER_BY = 5;
/** Hull area that the quad must fill. */
const MIN_FILL = 0.86;

/** One where a pixel is clearly darker than the mean of its neighbourhood. */
function darkMask({ widthPx, heightPx, grey }: GreyPicture): Uint8Array {
  const stride = widthPx + 1;
  const integral = new Uint32Array(stride * (heightPx + 1));
  for (let y = 0; y < heightPx; y++) {
    let row = 0;
    for (let x = 0; x < widthPx; x++) {
      row += grey[y * widthPx + x] ?? 0;
      integral[(y + 1) * stride + x + 1] = (integral[y * stride + x + 1] ?? 0) + row;
    }
  }
  const reach = Math.max(8, Math.round(Math.max(widthPx, heightPx) * WINDOW_SHARE));
  const mask = new Uint8Array(widthPx * heightPx);
  for (let y = 0; y < heightPx; y++) {
    const top = Math.max(y - reach, 0) * stride;
    const bottom = Math.min(y + reach + 1, heightPx) * stride;
    const rows = (bottom - top) / stride;
    for (let x = 0; x < widthPx; x++) {
      const left = Math.max(x - reach, 0);
      const right = Math.min(x + reach + 1, widthPx);
      const sum =
        (integral[bottom + right] ?? 0) -
        (integral[bottom + left] ?? 0) -
        (integral[top + right] ?? 0) +
        (integral[top + left] ?? 0);
      const mean = sum / (rows * (right - left));
      const value = grey[y * widthPx + x] ?? 0;
      mask[y * widthPx + x] = value < mean - Math.max(DARKER_BY, DARKER_BY_SHARE * mean) ? 1 : 0;
    }
  }
  return mask;
}

/** Pixels of each four-connected dark patch of a plausible size: the outermost ones of every row. */
function darkPatches(mask: Uint8Array, widthPx: number, heightPx: number): readonly (readonly PixelPoint[])[] {
  const seen = new Uint8Array(mask.length);
  const stack: number[] = [];
  const patches: PixelPoint[][] = [];
  const maxSide = MAX_SIDE_SHARE * Math.max(widthPx, heightPx);
  for (let start = 0; start < mask.length; start++) {
    if (mask[start] !== 1 || seen[start] === 1) continue;
    const rows = new Map<number, [number, number]>();
    let minX = widthPx;
    let maxX = 0;
    stack.push(start);
    seen[start] = 1;
    while (stack.length > 0) {
      const at = stack.pop() ?? 0;
      const x = at % widthPx;
      const y = (at - x) / widthPx;
      minX = Math.min(minX, x);
      maxX = Math.max(maxX, x);
      const row = rows.get(y);
      if (!row) rows.set(y, [x, x]);
      else if (x < row[0]) row[0] = x;
      else if (x > row[1]) row[1] = x;
      for (const next of [x > 0 ? at - 1 : at, x + 1 < widthPx ? at + 1 : at, at - widthPx, at + widthPx]) {
        if (mask[next] !== 1 || seen[next] === 1) continue;
        seen[next] = 1;
        stack.push(next);
      }
    }
    const width = maxX - minX + 1;
    if (Math.min(width, rows.size) < MIN_SIDE_PX || Math.max(width, rows.size) > maxSide) continue;
    patches.push(
      [...rows].flatMap(([y, [left, right]]) => [
        { x: left, y },
        { x: right, y },
      ]),
    );
  }
  return patches;
}

function cross(o: PixelPoint, a: PixelPoint, b: PixelPoint): number {
  return (a.x - o.x) * (b.y - o.y) - (a.y - o.y) * (b.x - o.x);
}

/** Convex hull, clockwise as seen with y down (Andrew's monotone chain, 1979). */
function convexHull(points: readonly PixelPoint[]): readonly PixelPoint[] {
  const sorted = [...points].sort((a, b) => a.x - b.x || a.y - b.y);
  const half = (ordered: readonly PixelPoint[]): PixelPoint[] => {
    const chain: PixelPoint[] = [];
    for (const point of ordered) {
      for (;;) {
        const last = chain.at(-1);
        const before = chain.at(-2);
        if (!last || !before || cross(before, last, point) > 0) break;
        chain.pop();
      }
      chain.push(point);
    }
    chain.pop();
    return chain;
  };
  return [...half(sorted), ...half([...sorted].reverse())];
}

function area(polygon: readonly PixelPoint[]): number {
  let sum = 0;
  polygon.forEach((a, index) => {
    const b = polygon[(index + 1) % polygon.length] ?? a;
    sum += a.x * b.y - a.y * b.x;
  });
  return Math.abs(sum) / 2;
}

function farthest(hull: readonly PixelPoint[], distance: (point: PixelPoint) => number): PixelPoint | null {
  let best: PixelPoint | null = null;
  for (const point of hull) if (best === null || distance(point) > distance(best)) best = point;
  return best;
}

/** The quadrilateral that a hull nearly is, or `null`. */
function quadOfHull(hull: readonly PixelPoint[]): Quad | null {
  const any = hull[0];
  if (!any) return null;
  const apart = (o: PixelPoint) => (p: PixelPoint) => Math.hypot(p.x - o.x, p.y - o.y);
  const first = farthest(hull, apart(any));
  const third = first && farthest(hull, apart(first));
  if (!first || !third) return null;
  const second = farthest(hull, (p) => cross(first, third, p));
  const fourth = farthest(hull, (p) => -cross(first, third, p));
  if (!second || !fourth) return null;
  const quad: Quad = [first, fourth, third, second];
  const sides = quad.map((corner, k) => apart(corner)(quad[((k + 1) % 4) as 0 | 1 | 2 | 3]));
  if (Math.min(...sides) < MIN_SIDE_PX * 0.7 || Math.max(...sides) > 4 * Math.min(...sides)) return null;
  return area(quad) >= MIN_FILL * area(hull) ? quad : null;
}

/** Dark patches that look like a square seen askew. */
export function findDarkQuads(picture: GreyPicture): readonly Quad[] {
  const patches = darkPatches(darkMask(picture), picture.widthPx, picture.heightPx);
  return patches.flatMap((patch) => {
    const quad = quadOfHull(convexHull(patch));
    return quad ? [quad] : [];
  });
}
