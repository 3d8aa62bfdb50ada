import type { Point } from '../geometry/point';

/** A line as the points where nx x + ny y = offsetMm, (nx, ny) of length one. */
export interface FittedLine {
  readonly kind: 'line';
  readonly nx: number;
  readonly ny: number;
  readonly offsetMm: number;
}

export interface FittedCircle {
  readonly kind: 'arc';
  readonly centre: Point;
  readonly radiusMm: number;
}

export type FittedPrimitive = FittedLine | FittedCircle;

/** A fit and the sum of its squared distances, mm2. */
export interface MomentFit<T extends FittedPrimitive> {
  readonly primitive: T;
  readonly squaresMm2: number;
}

const TERMS = 8;

/**
 * Running sums over a chain of points, so that the best line or circle through any stretch costs the same few
 * operations however long the stretch is. Sums are taken about the chain's middle to keep their digits.
 */
export class PrefixMoments {
  private readonly sums: Float64Array;
  private readonly middle: Point;

  constructor(private readonly points: readonly Point[]) {
    let x = 0;
    let y = 0;
    for (const point of points) {
      x += point.x;
      y += point.y;
    }
    const count = Math.max(points.length, 1);
    this.middle = { x: x / count, y: y / count };
    this.sums = new Float64Array((points.length + 1) * TERMS);
    points.forEach((point, index) => {
      const px = point.x - this.middle.x;
      const py = point.y - this.middle.y;
      const pz = px * px + py * py;
      const terms = [px, py, px * px, px * py, py * py, px * pz, py * pz, pz * pz];
      terms.forEach((term, k) => {
        this.sums[(index + 1) * TERMS + k] = (this.sums[index * TERMS + k] ?? 0) + term;
      });
    });
  }

  get length(): number {
    return this.points.length;
  }

  private sum(term: number, first: number, end: number): number {
    return (this.sums[end * TERMS + term] ?? 0) - (this.sums[first * TERMS + term] ?? 0);
  }

  /** Best line through points `first` up to but not including `end`; at least two points. */
  line(first: number, end: number): MomentFit<FittedLine> {
    const count = end - first;
    const mx = this.sum(0, first, end) / count;
    const my = this.sum(1, first, end) / count;
    const sxx = this.sum(2, first, end) - count * mx * mx;
    const sxy = this.sum(3, first, end) - count * mx * my;
    const syy = this.sum(4, first, end) - count * my * my;
    const turn = 0.5 * Math.atan2(2 * sxy, sxx - syy);
    const nx = -Math.sin(turn);
    const ny = Math.cos(turn);
    const squares = nx * nx * sxx + 2 * nx * ny * sxy + ny * ny * syy;
    const offset = nx * (mx + this.middle.x) + ny * (my + this.middle.y);
    return { primitive: { kind: 'line', nx, ny, offsetMm: offset }, squaresMm2: Math.max(squares, 0) };
  }

  /**
   * Best circle by Kasa's algebraic fit (1976), its algebraic error brought to distances by 1 / (2 R). Short arcs come
   * out a little too small; `null` for points on a line.
   */
  circle(first: number, end: number): MomentFit<FittedCircle> | null {
    const count = end - first;
    const mx = this.sum(0, first, end) / count;
    const my = this.sum(1, first, end) / count;
    const sxx = this.sum(2, first, end) / count - mx * mx;
    const sxy = this.sum(3, first, end) / count - mx * my;
    const syy = this.sum(4, first, end) / count - my * my;
    const mz = sxx + syy + mx * mx + my * my;
    const sxz = this.sum(5, first, end) / count - mx * mz;
    const syz = this.sum(6, first, end) / count - my * mz;
    const szz = this.sum(7, first, end) / count - mz * mz;
    const determinant = sxx * syy - sxy * sxy;
    if (determinant <= 1e-12 * (sxx + syy) ** 2) return null;
    const a = (sxz * syy - syz * sxy) / determinant;
    const b = (syz * sxx - sxz * sxy) / determinant;
    const cx = a / 2;
    const cy = b / 2;
    const radiusSquared = mz - a * mx - b * my + cx * cx + cy * cy;
    if (!(radiusSquared > 0)) return null;
    const algebraic = Math.max(szz - a * sxz - b * syz, 0) * count;
    return {
      primitive: {
        kind: 'arc',
        centre: { x: cx + this.middle.x, y: cy + this.middle.y },
        radiusMm: Math.sqrt(radiusSquared),
      },
      squaresMm2: algebraic / (4 * radiusSquared),
    };
  }
}
