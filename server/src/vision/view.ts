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

/**
 * The same view with the page lifted to a height, mm: what stands that high lies where it belongs. With the page squared
 * up at the template's upper face, an outline drawn over the picture meets the face's edge all round.
 */
export function viewAtHeight(view: View, heightMm: number): View {
  const { eye } = view;
  if (eye === null || heightMm <= 0 || eye.z <= heightMm) return view;
  // A line of sight through (x, y, height) meets the page this much further from the point below the eye.
  const further = heightMm / (eye.z - heightMm);
  return { eye, toPixel: (x, y) => view.toPixel(x + (x - eye.x) * further, y + (y - eye.y) * further) };
}
