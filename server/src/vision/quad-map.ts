import { solveSymmetric } from '@foldwright/shared/fitting/least-squares';
import type { PixelPoint, Quad } from './dark-quads';

/** A plane projective map, row-major 3 x 3. */
export type Homography = readonly [number, number, number, number, number, number, number, number, number];

export function applyHomography(h: Homography, x: number, y: number): PixelPoint {
  const w = h[6] * x + h[7] * y + h[8];
  return { x: (h[0] * x + h[1] * y + h[2]) / w, y: (h[3] * x + h[4] * y + h[5]) / w };
}

/**
 * Homography that best takes `from` to `to` (four pairs or more), by normalised least squares with the last entry one.
 * `null` when the points do not determine it.
 */
export function fitHomography(from: readonly PixelPoint[], to: readonly PixelPoint[]): Homography | null {
  const a = normalise(from);
  const b = normalise(to);
  const matrix: number[] = new Array<number>(64).fill(0);
  const right: number[] = new Array<number>(8).fill(0);
  from.forEach((point, index) => {
    const target = to[index];
    if (!target) return;
    const x = (point.x - a.x) / a.scale;
    const y = (point.y - a.y) / a.scale;
    const u = (target.x - b.x) / b.scale;
    const v = (target.y - b.y) / b.scale;
    const rows = [
      { terms: [x, y, 1, 0, 0, 0, -u * x, -u * y], value: u },
      { terms: [0, 0, 0, x, y, 1, -v * x, -v * y], value: v },
    ];
    for (const { terms, value } of rows) {
      terms.forEach((term, i) => {
        right[i] = (right[i] ?? 0) + term * value;
        terms.forEach((other, j) => {
          matrix[i * 8 + j] = (matrix[i * 8 + j] ?? 0) + term * other;
        });
      });
    }
  });
  const n = solveSymmetric(matrix, right, 1e-13);
  if (!n) return null;
  const [n0 = 0, n1 = 0, n2 = 0, n3 = 0, n4 = 0, n5 = 0, n6 = 0, n7 = 0] = n;
  // to = B^-1 N A with A, B the normalising maps.
  const left = [
    [b.scale * n0 + b.x * n6, b.scale * n1 + b.x * n7, b.scale * n2 + b.x],
    [b.scale * n3 + b.y * n6, b.scale * n4 + b.y * n7, b.scale * n5 + b.y],
    [n6, n7, 1],
  ];
  const s = 1 / a.scale;
  const entries = left.map(([p = 0, q = 0, r = 0]) => [p * s, q * s, r - (p * a.x + q * a.y) * s]);
  const [r0 = [], r1 = [], r2 = []] = entries;
  return [r0[0] ?? 0, r0[1] ?? 0, r0[2] ?? 0, r1[0] ?? 0, r1[1] ?? 0, r1[2] ?? 0, r2[0] ?? 0, r2[1] ?? 0, r2[2] ?? 1];
}

function normalise(points: readonly PixelPoint[]): { x: number; y: number; scale: number } {
  const count = Math.max(points.length, 1);
  const x = points.reduce((sum, p) => sum + p.x, 0) / count;
  const y = points.reduce((sum, p) => sum + p.y, 0) / count;
  const spread = points.reduce((sum, p) => sum + Math.hypot(p.x - x, p.y - y), 0) / count;
  return { x, y, scale: spread || 1 };
}

/** Map from a square of `cells` x `cells` (x right, y down from the quad's first corner) to pixels. */
export function quadToSquare(quad: Quad, cells: number): (x: number, y: number) => PixelPoint {
  const square = [
    { x: 0, y: 0 },
    { x: cells, y: 0 },
    { x: cells, y: cells },
    { x: 0, y: cells },
  ];
  const h = fitHomography(square, quad);
  return (x, y) => (h ? applyHomography(h, x, y) : quad[0]);
}
