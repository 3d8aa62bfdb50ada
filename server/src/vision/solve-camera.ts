import { minimise } from '@foldwright/shared/fitting/least-squares';
import type { Point } from '@foldwright/shared/geometry/point';
import { type Camera, multiplyRotations, projectPoint, type Rotation, rotationOf } from './camera';
import type { PixelPoint } from './dark-quads';
import { fitHomography, type Homography } from './quad-map';

/** A point of the page and where it is seen. */
export interface Sighting {
  readonly page: Point;
  readonly seen: PixelPoint;
  /** Sightings with the same group are trusted or dropped together. */
  readonly group: number;
}

export interface CameraOptions {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Focal length noted by the camera in terms of a 36 mm sensor, `null` when unknown. */
  readonly focal35Mm: number | null;
  /** Whether the points can tell the lens from the pose; a few corners cannot. */
  readonly solvesLens: boolean;
}

export interface SolvedCamera {
  readonly camera: Camera;
  /** Groups left out because they do not fit the others. */
  readonly droppedGroups: ReadonlySet<number>;
  /** Root mean square distance between points seen and points computed, pixels. */
  readonly rmsPx: number;
}

const SENSOR_WIDTH_MM = 36;
/** A telephone's main camera, for photos that do not say. */
const USUAL_FOCAL_35_MM = 27;
/** How far a noted focal length may be off: rounding, and sensors measured by width or by diagonal. */
const NOTED_FOCAL_SHARE = 0.06;
const UNKNOWN_FOCAL_SHARE = 0.3;
/** How far from the picture's middle the lens' axis may be, as a share of the long side. */
const AXIS_SHARE = 0.006;
const K1_SPREAD = 0.15;
const K2_SPREAD = 0.05;
const CORNER_SIGMA_PX = 0.12;
const MIN_GROUPS = 3;

function normalised(v: readonly [number, number, number]): readonly [number, number, number] {
  const length = Math.hypot(...v);
  return [v[0] / length, v[1] / length, v[2] / length];
}

/** Focal length from the two orthogonality conditions of a plane's homography; `null` when it tells nothing. */
function focalOfHomography(h: Homography): number | null {
  const [a, b, , c, d, , e, f] = h;
  const across = -(a * b + c * d) / (e * f);
  const along = (a * a + c * c - b * b - d * d) / (f * f - e * e);
  const weightAcross = Math.abs(e * f);
  const weightAlong = Math.abs(f * f - e * e);
  const squared = weightAcross > weightAlong ? across : along;
  return squared > 0 && Number.isFinite(squared) ? Math.sqrt(squared) : null;
}

/** Pose of a page seen by a plain pinhole with its axis in the picture's middle. */
function poseOf(h: Homography, focalPx: number): { rotation: Rotation; shift: readonly [number, number, number] } {
  const column = (k: number): readonly [number, number, number] => [
    (h[k] ?? 0) / focalPx,
    (h[k + 3] ?? 0) / focalPx,
    h[k + 6] ?? 0,
  ];
  const [first, second, third] = [column(0), column(1), column(2)];
  let scale = 2 / (Math.hypot(...first) + Math.hypot(...second));
  if (third[2] * scale < 0) scale = -scale;
  const x = normalised([first[0] * scale, first[1] * scale, first[2] * scale]);
  const raw: readonly [number, number, number] = [second[0] * scale, second[1] * scale, second[2] * scale];
  const along = x[0] * raw[0] + x[1] * raw[1] + x[2] * raw[2];
  const y = normalised([raw[0] - along * x[0], raw[1] - along * x[1], raw[2] - along * x[2]]);
  const z = [x[1] * y[2] - x[2] * y[1], x[2] * y[0] - x[0] * y[2], x[0] * y[1] - x[1] * y[0]] as const;
  return {
    rotation: [x[0], y[0], z[0], x[1], y[1], z[1], x[2], y[2], z[2]],
    shift: [third[0] * scale, third[1] * scale, third[2] * scale],
  };
}

function startCamera(
  sightings: readonly Sighting[],
  options: CameraOptions,
): { start: Camera; focalSpread: number } | null {
  const longSide = Math.max(options.widthPx, options.heightPx);
  const middleX = (options.widthPx - 1) / 2;
  const middleY = (options.heightPx - 1) / 2;
  const h = fitHomography(
    sightings.map((s) => s.page),
    sightings.map((s) => ({ x: s.seen.x - middleX, y: s.seen.y - middleY })),
  );
  if (!h) return null;
  const noted = ((options.focal35Mm ?? USUAL_FOCAL_35_MM) / SENSOR_WIDTH_MM) * longSide;
  const measured = options.focal35Mm === null ? focalOfHomography(h) : null;
  const isPlausible = measured !== null && measured > 0.4 * longSide && measured < 4 * longSide;
  const focalPx = isPlausible ? measured : noted;
  const pose = poseOf(h, focalPx);
  return {
    start: { focalPx, principalX: middleX, principalY: middleY, k1: 0, k2: 0, ...pose },
    focalSpread: options.focal35Mm === null ? UNKNOWN_FOCAL_SHARE : NOTED_FOCAL_SHARE,
  };
}

function solveOnce(sightings: readonly Sighting[], options: CameraOptions): Camera | null {
  const begun = startCamera(sightings, options);
  if (!begun) return null;
  const { start, focalSpread } = begun;
  const longSide = Math.max(options.widthPx, options.heightPx);
  const unpack = (p: readonly number[]): Camera => {
    const [rx = 0, ry = 0, rz = 0, tx = 0, ty = 0, tz = 0, focal = 0, px = 0, py = 0, k1 = 0, k2 = 0] = p;
    return {
      focalPx: start.focalPx * Math.exp(focal),
      principalX: start.principalX + px,
      principalY: start.principalY + py,
      k1,
      k2,
      rotation: multiplyRotations(rotationOf(rx, ry, rz), start.rotation),
      shift: [start.shift[0] + tx, start.shift[1] + ty, start.shift[2] + tz],
    };
  };
  const lensSpread = options.solvesLens ? 1 : 1e-4;
  const residuals = (p: readonly number[]): Float64Array => {
    const camera = unpack(p);
    const values = new Float64Array(sightings.length * 2 + 5);
    sightings.forEach((sighting, index) => {
      const at = projectPoint(camera, sighting.page.x, sighting.page.y, 0);
      values[2 * index] = (at.x - sighting.seen.x) / CORNER_SIGMA_PX;
      values[2 * index + 1] = (at.y - sighting.seen.y) / CORNER_SIGMA_PX;
    });
    const priors = [
      (p[6] ?? 0) / focalSpread,
      (p[7] ?? 0) / (AXIS_SHARE * longSide * lensSpread),
      (p[8] ?? 0) / (AXIS_SHARE * longSide * lensSpread),
      (p[9] ?? 0) / (K1_SPREAD * lensSpread),
      (p[10] ?? 0) / (K2_SPREAD * lensSpread),
    ];
    values.set(priors, sightings.length * 2);
    return values;
  };
  const steps = [1e-6, 1e-6, 1e-6, 1e-3, 1e-3, 1e-3, 1e-5, 1e-2, 1e-2, 1e-5, 1e-5];
  return unpack(minimise(residuals, new Array<number>(11).fill(0), { steps, maxIterations: 40 }).parameters);
}

function missPx(camera: Camera, sighting: Sighting): number {
  const at = projectPoint(camera, sighting.page.x, sighting.page.y, 0);
  return Math.hypot(at.x - sighting.seen.x, at.y - sighting.seen.y);
}

function rms(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / Math.max(values.length, 1));
}

function worstGroup(
  camera: Camera,
  sightings: readonly Sighting[],
): { group: number; missPx: number; usualPx: number } {
  const groups = new Map<number, number[]>();
  for (const s of sightings) groups.set(s.group, [...(groups.get(s.group) ?? []), missPx(camera, s)]);
  const means = [...groups].map(([group, misses]) => ({ group, missPx: rms(misses) }));
  means.sort((a, b) => b.missPx - a.missPx);
  const usualPx = means[means.length >> 1]?.missPx ?? 0;
  return { group: means[0]?.group ?? -1, missPx: means[0]?.missPx ?? 0, usualPx };
}

/**
 * The camera that sees the page points where they were seen. Groups that stand out are dropped one by one.
 * `null` when the points do not determine a camera.
 */
export function solveCamera(sightings: readonly Sighting[], options: CameraOptions): SolvedCamera | null {
  const dropped = new Set<number>();
  let kept = sightings;
  for (;;) {
    const camera = solveOnce(kept, options);
    if (!camera || !Number.isFinite(camera.focalPx)) return null;
    const worst = worstGroup(camera, kept);
    const groupCount = new Set(kept.map((s) => s.group)).size;
    if (
      groupCount <= MIN_GROUPS ||
      worst.missPx < Math.max(0.5, 4 * worst.usualPx) ||
      dropped.size > sightings.length / 12
    ) {
      return { camera, droppedGroups: dropped, rmsPx: rms(kept.map((s) => missPx(camera, s))) };
    }
    dropped.add(worst.group);
    kept = kept.filter((s) => s.group !== worst.group);
  }
}
