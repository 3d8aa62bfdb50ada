/** A point or vector in a plane. `x` and `y` are millimetres; y points up. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A point or vector in space, mm, right-handed, z towards the viewer of face A. */
export interface Point3 {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** Axis-aligned bounds in mm. Empty geometry has no bounds; functions answer `null` for it. */
export interface Bounds {
  readonly min: Point;
  readonly max: Point;
}
