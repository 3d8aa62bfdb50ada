import type { Trace } from '@foldwright/shared/fitting/trace';
import type { PixelPoint } from './dark-quads';

/** A re-encoded picture without metadata. */
export interface EncodedPicture {
  readonly jpeg: Buffer;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Everything that reading a photo yields. */
export interface PhotoReading {
  readonly trace: Trace;
  /** The page squared up: its lower-left corner is the frame's origin. */
  readonly rectified: {
    readonly jpeg: Buffer;
    readonly pixelsPerMm: number;
    readonly widthMm: number;
    readonly heightMm: number;
  };
  /** The upright photo, at most 2400 pixels long. */
  readonly display: EncodedPicture;
  /** Boundaries as they are seen, in pixels of `display`: the outline first, then the openings. */
  readonly photoOutline: readonly (readonly PixelPoint[])[];
}
