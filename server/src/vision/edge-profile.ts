import { solveSymmetric } from '@foldwright/shared/fitting/least-squares';
import type { Point } from '@foldwright/shared/geometry/point';
import { isInside, type Picture, sampleLinear } from './picture';
import type { View } from './view';

/** Where the edge is on one profile. */
export interface ProfileEdge {
  /** Along the normal from the profile's origin, mm, positive away from the template. */
  readonly offsetMm: number;
  /** Share of the profile's variation that the model leaves unexplained, 0 to 1. */
  readonly unexplained: number;
  /** Step of light over the edge in linear units, the largest of the channels. */
  readonly step: number;
}

export interface ProfileRequest {
  readonly origin: Point;
  /** Unit vector away from the template. */
  readonly normal: Point;
  /** Visible width of the cut edge behind the boundary, mm; 0 where it is hidden. */
  readonly wallMm: number;
  /** Blur of the photo here, mm (standard deviation). */
  readonly blurMm: number;
  /** How far to look both ways, mm. */
  readonly reachMm: number;
}

const STEP_MM = 0.07;
const GROUND_SPAN_MM = 0.6;
const FACE_SPAN_MM = 0.45;
/** Walls are followed inwards only so far: what lies deeper does not move the foot. */
const MAX_WALL_MM = 0.5;
const FINE_STEPS = 10;
const MAX_SAMPLES = 96;

const NORMAL_TABLE = Float64Array.from({ length: 801 }, (_, k) => gaussianShare((k - 400) / 100));

/** Share of a normal distribution below z: Abramowitz and Stegun 26.2.17, good to 7.5e-8. */
function gaussianShare(z: number): number {
  const t = 1 / (1 + 0.2316419 * Math.abs(z));
  const tail =
    (Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)) *
    t *
    (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
  return z >= 0 ? 1 - tail : tail;
}

function blurredStep(s: number, blurMm: number): number {
  const z = s / blurMm;
  if (z <= -4) return 0;
  if (z >= 4) return 1;
  return NORMAL_TABLE[Math.round(z * 100) + 400] ?? 0;
}

const samples = new Float32Array(MAX_SAMPLES * 3);
const basis = new Float64Array(4);

interface Fit {
  readonly error: number;
  readonly levels: readonly (readonly number[])[];
}

/** Least squares of ground, its slope, wall and face for an edge at `edge`, all three channels. */
function fitLevels(request: ProfileRequest, firstS: number, count: number, edge: number): Fit {
  const { wallMm, blurMm } = request;
  const matrix = [0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0];
  const right: readonly [number[], number[], number[]] = [
    [0, 0, 0, 0],
    [0, 0, 0, 0],
    [0, 0, 0, 0],
  ];
  const total = [0, 0, 0];
  for (let k = 0; k < count; k++) {
    const s = firstS + k * STEP_MM - edge;
    const ground = blurredStep(s, blurMm);
    const face = 1 - blurredStep(s + wallMm, blurMm);
    basis[0] = ground;
    basis[1] = ground * s;
    basis[2] = 1 - ground - face;
    basis[3] = face;
    for (let i = 0; i < 4; i++) {
      for (let j = 0; j <= i; j++) matrix[i * 4 + j] = (matrix[i * 4 + j] ?? 0) + (basis[i] ?? 0) * (basis[j] ?? 0);
      for (let c = 0; c < 3; c++) {
        const column = right[c as 0 | 1 | 2];
        column[i] = (column[i] ?? 0) + (basis[i] ?? 0) * (samples[k * 3 + c] ?? 0);
      }
    }
    for (let c = 0; c < 3; c++) total[c] = (total[c] ?? 0) + (samples[k * 3 + c] ?? 0) ** 2;
  }
  for (let i = 0; i < 4; i++) {
    matrix[i * 5] = (matrix[i * 5] ?? 0) + 1e-4;
    for (let j = 0; j < i; j++) matrix[j * 4 + i] = matrix[i * 4 + j] ?? 0;
  }
  let error = 0;
  const levels: (readonly number[])[] = [];
  for (let c = 0; c < 3; c++) {
    const column = right[c as 0 | 1 | 2];
    const level = solveSymmetric(matrix, column) ?? [0, 0, 0, 0];
    levels.push(level);
    error += (total[c] ?? 0) - level.reduce((sum, value, i) => sum + value * (column[i] ?? 0), 0);
  }
  return { error, levels };
}

function variation(count: number): number {
  let sum = 0;
  for (let c = 0; c < 3; c++) {
    let mean = 0;
    for (let k = 0; k < count; k++) mean += samples[k * 3 + c] ?? 0;
    mean /= count;
    for (let k = 0; k < count; k++) sum += ((samples[k * 3 + c] ?? 0) - mean) ** 2;
  }
  return sum;
}

/**
 * Finds the template's edge along one normal of its outline: the place at which ground, cut edge and face, each of one
 * lightness (the ground may slope into a shadow) and blurred as the photo is, explain what is seen best.
 * `null` where the photo does not reach or nothing changes.
 */
export function findProfileEdge(picture: Picture, view: View, request: ProfileRequest): ProfileEdge | null {
  const { origin, normal, reachMm } = request;
  const wall = Math.min(request.wallMm, MAX_WALL_MM);
  const firstS = -(reachMm + wall + FACE_SPAN_MM);
  const count = Math.min(MAX_SAMPLES, Math.ceil((reachMm + GROUND_SPAN_MM - firstS) / STEP_MM) + 1);
  for (let k = 0; k < count; k++) {
    const s = firstS + k * STEP_MM;
    const at = view.toPixel(origin.x + normal.x * s, origin.y + normal.y * s);
    if (!isInside(picture, at.x, at.y)) return null;
    sampleLinear(picture, at.x, at.y, samples, k * 3);
  }
  const seen = variation(count);
  if (seen < 1e-6) return null;
  let best = { edge: 0, error: Number.POSITIVE_INFINITY };
  for (let edge = -reachMm; edge <= reachMm + 1e-9; edge += STEP_MM) {
    const { error } = fitLevels(request, firstS, count, edge);
    if (error < best.error) best = { edge, error };
  }
  // Golden section between the neighbours of the best grid place.
  let low = best.edge - STEP_MM;
  let high = best.edge + STEP_MM;
  for (let k = 0; k < FINE_STEPS; k++) {
    const a = high - (high - low) * 0.618034;
    const b = low + (high - low) * 0.618034;
    if (fitLevels(request, firstS, count, a).error < fitLevels(request, firstS, count, b).error) high = b;
    else low = a;
  }
  const edge = (low + high) / 2;
  const fit = fitLevels(request, firstS, count, edge);
  const steps = fit.levels.map((level) => Math.abs((level[0] ?? 0) - (request.wallMm > request.blurMm ? (level[2] ?? 0) : (level[3] ?? 0))));
  return { offsetMm: edge, unexplained: Math.max(fit.error, 0) / seen, step: Math.max(...steps) };
}
