import type { PixelPoint, Quad } from './dark-quads';

/** Where the scale of a photo comes from. */
export type ScaleSource =
  | { readonly kind: 'markers' }
  /** A flatbed scan, dots per inch. */
  | { readonly kind: 'scan'; readonly dpi: number }
  /** Corners of a flat rectangle: lower left, lower right, upper right, upper left of its own frame. */
  | { readonly kind: 'rectangle'; readonly widthMm: number; readonly heightMm: number; readonly corners: Quad }
  | { readonly kind: 'two-points'; readonly from: PixelPoint; readonly to: PixelPoint; readonly distanceMm: number };

/** What a person says about a photo. */
export interface ReadingOptions {
  /** Thickness of the template, mm. */
  readonly thicknessMm: number;
  /** How far the thickness may be off, mm. */
  readonly thicknessDoubtMm?: number;
  /** What 100 mm of the sheet's rulers really measure, over 100: across, up. */
  readonly printScale?: readonly [number, number];
  readonly scale?: ScaleSource;
}
