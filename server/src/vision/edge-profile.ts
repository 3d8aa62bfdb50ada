import type { Point } from '@foldwright/shared/geometry/point';
import { isInside, type Picture, sampleLinear } from './picture';
import type { View } from './view';

/** Where the edge is on one profile. */
export interface ProfileEdge {
  /** Along the normal from the profile's origin, mm, positive away from the template. */
  readonly offsetMm: number;
  /** Share of the profile's variation that the model leaves unexplained, 0 to 1. */
  readonly unexplained: number;
  /** Step of lightness or tint over the edge, the largest of them, in linear units. */
  readonly step: number;
  /** That step over the spread of what the model leaves unexplained. */
  readonly significance: number;
}

export interface ProfileRequest {
  readonly origin: Point;
  /** Unit vector away from the template. */
  readonly normal: Point;
  /** Visible width of the cut edge behind the boundary, mm; 0 where it is hidden. */
  readonly wallMm: number;
  /** Blur of the photo here, mm (standard deviation). */
  readonly blurMm: number;
  /** How far to look inwards and outwards, mm. */
  readonly inwardMm: number;
  readonly outwardMm: number;
  /** For edges without a step in lightness: tint counts more, and the mean of profiles side by side is taken. */
  readonly isFaint: boolean;
}

const STEP_MM = 0.08;
const GROUND_SPAN_MM = 0.6;
const FACE_SPAN_MM = 0.45;
/** Walls are followed inwards only so far: what lies deeper does not move the foot. */
const MAX_WALL_MM = 3;
const FINE_STEPS = 7;
const MAX_SAMPLES = 200;

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

const LEVELS = 4;
const CHANNELS = 3;
const RIDGE = 1e-4;
const TINT_WEIGHT = 3;
/** Faint edges are averaged this far both ways along the edge, mm, in so many steps each way. */
const FAINT_SPAN_MM = 1.2;
const SIDES = 4;

// One photo is read at a time and this runs some hundred thousand times for it: its working space is laid out once.
const samples = new Float32Array(MAX_SAMPLES * CHANNELS);
const basis = new Float64Array(LEVELS);
const lower = new Float64Array(LEVELS * LEVELS);
const right = new Float64Array(CHANNELS * LEVELS);
/** Ground, its slope, wall and face, for each channel. */
const levels = new Float64Array(CHANNELS * LEVELS);

/** Turns the lower half of a positive matrix into its Cholesky factor, in place. */
function factorise(matrix: Float64Array): void {
  for (let row = 0; row < LEVELS; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = matrix[row * LEVELS + column] ?? 0;
      for (let k = 0; k < column; k++) sum -= (matrix[row * LEVELS + k] ?? 0) * (matrix[column * LEVELS + k] ?? 0);
      matrix[row * LEVELS + column] =
        row === column ? Math.sqrt(Math.max(sum, 1e-12)) : sum / (matrix[column * LEVELS + column] ?? 1);
    }
  }
}

/** Solves for one channel's levels and answers how much of its sum of squares they explain. */
function solveChannel(channel: number): number {
  const base = channel * LEVELS;
  for (let row = 0; row < LEVELS; row++) {
    let sum = right[base + row] ?? 0;
    for (let k = 0; k < row; k++) sum -= (lower[row * LEVELS + k] ?? 0) * (levels[base + k] ?? 0);
    levels[base + row] = sum / (lower[row * LEVELS + row] ?? 1);
  }
  let explained = 0;
  for (let row = 0; row < LEVELS; row++) explained += (levels[base + row] ?? 0) ** 2;
  for (let row = LEVELS - 1; row >= 0; row--) {
    let sum = levels[base + row] ?? 0;
    for (let k = row + 1; k < LEVELS; k++) sum -= (lower[k * LEVELS + row] ?? 0) * (levels[base + k] ?? 0);
    levels[base + row] = sum / (lower[row * LEVELS + row] ?? 1);
  }
  return explained;
}

/** Least squares of the levels for an edge at `edge`; answers how much of all channels' sum of squares they explain. */
function fitLevels(wallMm: number, blurMm: number, firstS: number, count: number, edge: number): number {
  lower.fill(0);
  right.fill(0);
  for (let k = 0; k < count; k++) {
    const s = firstS + k * STEP_MM - edge;
    const ground = blurredStep(s, blurMm);
    const face = 1 - blurredStep(s + wallMm, blurMm);
    basis[0] = ground;
    basis[1] = ground * s;
    basis[2] = 1 - ground - face;
    basis[3] = face;
    for (let i = 0; i < LEVELS; i++) {
      const value = basis[i] ?? 0;
      if (value === 0) continue;
      for (let j = 0; j <= i; j++) lower[i * LEVELS + j] = (lower[i * LEVELS + j] ?? 0) + value * (basis[j] ?? 0);
      for (let c = 0; c < CHANNELS; c++) {
        right[c * LEVELS + i] = (right[c * LEVELS + i] ?? 0) + value * (samples[k * CHANNELS + c] ?? 0);
      }
    }
  }
  for (let i = 0; i < LEVELS; i++) lower[i * LEVELS + i] = (lower[i * LEVELS + i] ?? 0) + RIDGE;
  factorise(lower);
  return solveChannel(0) + solveChannel(1) + solveChannel(2);
}

function sumOfSquares(count: number): number {
  let sum = 0;
  for (let k = 0; k < count * CHANNELS; k++) sum += (samples[k] ?? 0) ** 2;
  return sum;
}

/**
 * Red, green and blue become lightness and two tints, the tints counted more: brushing, mottling and shadows change
 * lightness, while in a shadow as light as the face the tint alone still shows the edge.
 */
function spreadTint(at: number): void {
  const red = samples[at] ?? 0;
  const green = samples[at + 1] ?? 0;
  const blue = samples[at + 2] ?? 0;
  samples[at] = red + green + blue;
  samples[at + 1] = TINT_WEIGHT * (red - green);
  samples[at + 2] = TINT_WEIGHT * (blue - green);
}

/** One sample of the profile; false beyond the photo. */
function sampleAt(picture: Picture, view: View, x: number, y: number, k: number): boolean {
  const at = view.toPixel(x, y);
  if (!isInside(picture, at.x, at.y)) return false;
  sampleLinear(picture, at.x, at.y, samples, k * CHANNELS);
  return true;
}

/** The mean of samples along the edge, its tint brought out; false beyond the photo. */
function sampleAcross(picture: Picture, view: View, x: number, y: number, normal: Point, k: number): boolean {
  let [red, green, blue] = [0, 0, 0];
  for (let side = -SIDES; side <= SIDES; side++) {
    const along = (side * FAINT_SPAN_MM) / SIDES;
    if (!sampleAt(picture, view, x - normal.y * along, y + normal.x * along, k)) return false;
    red += samples[k * CHANNELS] ?? 0;
    green += samples[k * CHANNELS + 1] ?? 0;
    blue += samples[k * CHANNELS + 2] ?? 0;
  }
  const share = 1 / (2 * SIDES + 1);
  samples[k * CHANNELS] = red * share;
  samples[k * CHANNELS + 1] = green * share;
  samples[k * CHANNELS + 2] = blue * share;
  spreadTint(k * CHANNELS);
  return true;
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
  const { origin, normal, inwardMm, outwardMm } = request;
  const wall = Math.min(request.wallMm, MAX_WALL_MM);
  const firstS = -(inwardMm + wall + FACE_SPAN_MM);
  const count = Math.min(MAX_SAMPLES, Math.ceil((outwardMm + GROUND_SPAN_MM - firstS) / STEP_MM) + 1);
  for (let k = 0; k < count; k++) {
    const s = firstS + k * STEP_MM;
    const x = origin.x + normal.x * s;
    const y = origin.y + normal.y * s;
    if (!(request.isFaint ? sampleAcross(picture, view, x, y, normal, k) : sampleAt(picture, view, x, y, k)))
      return null;
  }
  const seen = variation(count);
  if (seen < 1e-6) return null;
  const explainedAt = (edge: number): number => fitLevels(wall, request.blurMm, firstS, count, edge);
  let best = 0;
  let bestExplained = Number.NEGATIVE_INFINITY;
  for (let edge = -inwardMm; edge <= outwardMm + 1e-9; edge += STEP_MM) {
    const explained = explainedAt(edge);
    if (explained > bestExplained) {
      best = edge;
      bestExplained = explained;
    }
  }
  // Golden section between the neighbours of the best grid place.
  const golden = 0.618034;
  let low = best - STEP_MM;
  let high = best + STEP_MM;
  let a = high - (high - low) * golden;
  let b = low + (high - low) * golden;
  let atA = explainedAt(a);
  let atB = explainedAt(b);
  for (let k = 0; k < FINE_STEPS; k++) {
    if (atA > atB) {
      [high, b, atB] = [b, a, atA];
      a = high - (high - low) * golden;
      atA = explainedAt(a);
    } else {
      [low, a, atA] = [a, b, atB];
      b = low + (high - low) * golden;
      atB = explainedAt(b);
    }
  }
  const edge = (low + high) / 2;
  const explained = explainedAt(edge);
  // What lies behind the ground's edge: the wall where enough of it shows, else the face.
  const behind = wall > request.blurMm ? 2 : 3;
  let step = 0;
  for (let c = 0; c < CHANNELS; c++) {
    step = Math.max(step, Math.abs((levels[c * LEVELS] ?? 0) - (levels[c * LEVELS + behind] ?? 0)));
  }
  const rest = Math.max(sumOfSquares(count) - explained, 1e-9);
  return { offsetMm: edge, unexplained: rest / seen, step, significance: step / Math.sqrt(rest / (count * CHANNELS)) };
}
