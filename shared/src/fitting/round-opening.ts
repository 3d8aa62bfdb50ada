import type { Point } from '../geometry/point';
import { minimise } from './least-squares';
import { PrefixMoments } from './moments';

export interface CircleFit {
  readonly centre: Point;
  readonly radiusMm: number;
  /** Root mean square of the distances of the nearest four fifths of the points, mm. */
  readonly rmsMm: number;
}

export interface ObroundFit {
  /** Centres of the two end radii. */
  readonly from: Point;
  readonly to: Point;
  readonly widthMm: number;
  readonly rmsMm: number;
}

/** Residual scale from which a point counts less and less (Huber), mm. */
const HUBER_MM = 0.1;

function huber(residualMm: number): number {
  const size = Math.abs(residualMm);
  return size <= HUBER_MM ? residualMm : Math.sign(residualMm) * Math.sqrt(HUBER_MM * (2 * size - HUBER_MM));
}

/** Points that may lie anywhere, a share: a shadow in the opening draws its own false edge. */
const STRAY_SHARE = 0.2;

/** Root mean square of the nearest points, strays left out. */
function rootMeanSquare(values: Float64Array): number {
  const squares = values.map((value) => value * value).sort();
  const kept = Math.max(1, Math.ceil(squares.length * (1 - STRAY_SHARE)));
  let sum = 0;
  for (let k = 0; k < kept; k++) sum += squares[k] ?? 0;
  return Math.sqrt(sum / kept);
}

/** Best circle through the points in the sense of distances, outliers held back; `null` for fewer than five. */
export function fitCircle(points: readonly Point[]): CircleFit | null {
  const start = points.length < 5 ? null : new PrefixMoments(points).circle(0, points.length);
  if (!start) return null;
  const { centre, radiusMm } = start.primitive;
  const residuals = (p: readonly number[]): Float64Array => {
    const [cx = 0, cy = 0, r = 0] = p;
    return Float64Array.from(points, (point) => Math.hypot(point.x - cx, point.y - cy) - r);
  };
  const fit = minimise((p) => residuals(p).map(huber), [centre.x, centre.y, radiusMm], { steps: [1e-5, 1e-5, 1e-5] });
  const [x = 0, y = 0, r = 0] = fit.parameters;
  return { centre: { x, y }, radiusMm: r, rmsMm: rootMeanSquare(residuals(fit.parameters)) };
}

/** Signed distance to an obround about (cx, cy): half length between end centres `half`, turned by `turn` radians. */
function obroundDistance(point: Point, cx: number, cy: number, turn: number, half: number, radius: number): number {
  const cosine = Math.cos(turn);
  const sine = Math.sin(turn);
  const along = (point.x - cx) * cosine + (point.y - cy) * sine;
  const across = (point.y - cy) * cosine - (point.x - cx) * sine;
  return Math.hypot(Math.max(Math.abs(along) - Math.abs(half), 0), across) - radius;
}

/** Best obround (two half circles joined by two lines) through the points; `null` for fewer than eight. */
export function fitObround(points: readonly Point[]): ObroundFit | null {
  if (points.length < 8) return null;
  const moments = new PrefixMoments(points).line(0, points.length).primitive;
  const turn = Math.atan2(-moments.nx, moments.ny);
  const direction = { x: Math.cos(turn), y: Math.sin(turn) };
  const along = points.map((p) => p.x * direction.x + p.y * direction.y);
  const across = points.map((p) => p.y * direction.x - p.x * direction.y);
  const range = (values: readonly number[]): readonly [number, number] => [Math.min(...values), Math.max(...values)];
  const [alongMin, alongMax] = range(along);
  const [acrossMin, acrossMax] = range(across);
  const radius = (acrossMax - acrossMin) / 2;
  const half = Math.max((alongMax - alongMin) / 2 - radius, 0.05);
  const middleAlong = (alongMin + alongMax) / 2;
  const middleAcross = (acrossMin + acrossMax) / 2;
  const start = [
    middleAlong * direction.x - middleAcross * direction.y,
    middleAlong * direction.y + middleAcross * direction.x,
    turn,
    half,
    radius,
  ];
  const residuals = (p: readonly number[]): Float64Array =>
    Float64Array.from(points, (point) => obroundDistance(point, p[0] ?? 0, p[1] ?? 0, p[2] ?? 0, p[3] ?? 0, p[4] ?? 0));
  const fit = minimise((p) => residuals(p).map(huber), start, { steps: [1e-5, 1e-5, 1e-6, 1e-5, 1e-5] });
  const [cx = 0, cy = 0, fitted = 0, fittedHalf = 0, fittedRadius = 0] = fit.parameters;
  const reach = Math.abs(fittedHalf);
  const reachX = reach * Math.cos(fitted);
  const reachY = reach * Math.sin(fitted);
  return {
    from: { x: cx - reachX, y: cy - reachY },
    to: { x: cx + reachX, y: cy + reachY },
    widthMm: 2 * fittedRadius,
    rmsMm: rootMeanSquare(residuals(fit.parameters)),
  };
}
