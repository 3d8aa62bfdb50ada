import type { Bounds, Point } from '@foldwright/shared/geometry/point';

/** A place on the screen, CSS pixels from the board's upper left corner. */
export interface ScreenPoint {
  readonly xPx: number;
  readonly yPx: number;
}

/** How the layout lies on the board: `origin` is where the layout's zero is drawn; y is turned over here and nowhere else. */
export interface Viewport {
  readonly pxPerMm: number;
  readonly origin: ScreenPoint;
}

/** Room to keep free around the drawing when it is fitted, px. */
export interface Insets {
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
  readonly left: number;
}

/** Limits of the zoom, px per mm: a sheet of 3 m on a phone, and a tenth of a millimetre under a finger. */
export const ZOOM_LIMITS = { least: 0.08, most: 120 } as const;

/** Where a point of the layout is drawn. */
export function toScreen(viewport: Viewport, point: Point): ScreenPoint {
  return {
    xPx: viewport.origin.xPx + point.x * viewport.pxPerMm,
    yPx: viewport.origin.yPx - point.y * viewport.pxPerMm,
  };
}

/** Which point of the layout is drawn there. */
export function toLayout(viewport: Viewport, at: ScreenPoint): Point {
  return {
    x: (at.xPx - viewport.origin.xPx) / viewport.pxPerMm,
    y: (viewport.origin.yPx - at.yPx) / viewport.pxPerMm,
  };
}

/** The same view moved by so many pixels. */
export function panBy(viewport: Viewport, xPx: number, yPx: number): Viewport {
  return { ...viewport, origin: { xPx: viewport.origin.xPx + xPx, yPx: viewport.origin.yPx + yPx } };
}

/** Zooms about a place that stays where it is. */
export function zoomAt(viewport: Viewport, factor: number, at: ScreenPoint): Viewport {
  const pxPerMm = Math.min(ZOOM_LIMITS.most, Math.max(ZOOM_LIMITS.least, viewport.pxPerMm * factor));
  const still = toLayout(viewport, at);
  return { pxPerMm, origin: { xPx: at.xPx - still.x * pxPerMm, yPx: at.yPx + still.y * pxPerMm } };
}

/** The view that shows bounds as large as they go between the insets, centred. */
export function fitBounds(bounds: Bounds, widthPx: number, heightPx: number, insets: Insets): Viewport {
  const freeWidth = Math.max(40, widthPx - insets.left - insets.right);
  const freeHeight = Math.max(40, heightPx - insets.top - insets.bottom);
  const widthMm = Math.max(1, bounds.max.x - bounds.min.x);
  const heightMm = Math.max(1, bounds.max.y - bounds.min.y);
  const wanted = Math.min(freeWidth / widthMm, freeHeight / heightMm);
  const pxPerMm = Math.min(ZOOM_LIMITS.most, Math.max(ZOOM_LIMITS.least, wanted));
  const middle = { x: (bounds.min.x + bounds.max.x) / 2, y: (bounds.min.y + bounds.max.y) / 2 };
  return {
    pxPerMm,
    origin: {
      xPx: insets.left + freeWidth / 2 - middle.x * pxPerMm,
      yPx: insets.top + freeHeight / 2 + middle.y * pxPerMm,
    },
  };
}

/** A step of 1, 2 or 5 times a power of ten, mm, that is at least so many pixels wide: for grids, rules and scale bars. */
export function roundStepMm(pxPerMm: number, leastPx: number): number {
  const wanted = leastPx / pxPerMm;
  const power = 10 ** Math.floor(Math.log10(wanted));
  for (const factor of [1, 2, 5]) if (factor * power >= wanted) return factor * power;
  return 10 * power;
}
