import type { Point, Point3 } from '@foldwright/shared/geometry/point';
import type { PixelPoint } from './dark-quads';

/** How a flat thing is seen: from millimetres to pixels, and what its height does to where it seems to lie. */
export interface View {
  /** Pixel of a page point at height zero. */
  toPixel(x: number, y: number): PixelPoint;
  /** Where the camera stands, or `null` when everything is seen straight from above. */
  readonly eye: Point3 | null;
}

/** Pixels per millimetre around a page point: the geometric mean of both directions. */
export function pixelsPerMmAt(view: View, at: Point): number {
  const a = view.toPixel(at.x, at.y);
  const b = view.toPixel(at.x + 1, at.y);
  const c = view.toPixel(at.x, at.y + 1);
  return Math.sqrt(Math.abs((b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x)));
}
