import type { Point, Point3 } from '@foldwright/shared/geometry/point';
import type { PixelPoint } from './dark-quads';

/** Row-major 3 x 3. */
export type Rotation = readonly [number, number, number, number, number, number, number, number, number];

/**
 * A pinhole with two radial terms. A page point X is seen at R X + t (x right, y down, z forwards), divided by z, times
 * 1 + k1 r2 + k2 r4 and the focal length, plus the principal point.
 */
export interface Camera {
  readonly focalPx: number;
  readonly principalX: number;
  readonly principalY: number;
  readonly k1: number;
  readonly k2: number;
  readonly rotation: Rotation;
  readonly shift: readonly [number, number, number];
}

/** Rotation of |v| radians about v (Rodrigues). */
export function rotationOf(vx: number, vy: number, vz: number): Rotation {
  const angle = Math.hypot(vx, vy, vz);
  if (angle < 1e-12) return [1, -vz, vy, vz, 1, -vx, -vy, vx, 1];
  const [x, y, z] = [vx / angle, vy / angle, vz / angle];
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  const u = 1 - c;
  return [
    c + x * x * u,
    x * y * u - z * s,
    x * z * u + y * s,
    y * x * u + z * s,
    c + y * y * u,
    y * z * u - x * s,
    z * x * u - y * s,
    z * y * u + x * s,
    c + z * z * u,
  ];
}

/** a after b. */
export function multiplyRotations(a: Rotation, b: Rotation): Rotation {
  const at = (row: number, column: number): number => {
    let sum = 0;
    for (let k = 0; k < 3; k++) sum += (a[row * 3 + k] ?? 0) * (b[k * 3 + column] ?? 0);
    return sum;
  };
  return [at(0, 0), at(0, 1), at(0, 2), at(1, 0), at(1, 1), at(1, 2), at(2, 0), at(2, 1), at(2, 2)];
}

/** Pixel of a page point, z mm above the page. */
export function projectPoint(camera: Camera, x: number, y: number, z: number): PixelPoint {
  const r = camera.rotation;
  const depth = r[6] * x + r[7] * y + r[8] * z + camera.shift[2];
  const u = (r[0] * x + r[1] * y + r[2] * z + camera.shift[0]) / depth;
  const v = (r[3] * x + r[4] * y + r[5] * z + camera.shift[1]) / depth;
  const squared = u * u + v * v;
  const factor = (1 + camera.k1 * squared + camera.k2 * squared * squared) * camera.focalPx;
  return { x: u * factor + camera.principalX, y: v * factor + camera.principalY };
}

/** Where the camera stands in the page frame, mm. */
export function cameraCentre(camera: Camera): Point3 {
  const r = camera.rotation;
  const [tx, ty, tz] = camera.shift;
  return {
    x: -(r[0] * tx + r[3] * ty + r[6] * tz),
    y: -(r[1] * tx + r[4] * ty + r[7] * tz),
    z: -(r[2] * tx + r[5] * ty + r[8] * tz),
  };
}

/** Angle between the camera's axis and the page's normal. */
export function cameraTiltDeg(camera: Camera): number {
  return (Math.acos(Math.min(1, Math.abs(camera.rotation[8]))) * 180) / Math.PI;
}

/** Page point, z mm above the page, that is seen on the same ray as the page point at height zero. */
export function liftPoint(centre: Point3, onPage: Point, z: number): Point {
  const share = z / centre.z;
  return { x: onPage.x + (centre.x - onPage.x) * share, y: onPage.y + (centre.y - onPage.y) * share };
}
