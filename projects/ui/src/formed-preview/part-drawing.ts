/** One painted piece: faces of one shade, or scribed lines. `d` is an SVG path at 1 px per mm. */
export type PaintedPiece =
  | { readonly kind: 'faces'; readonly shade: number; readonly d: string }
  | { readonly kind: 'lines'; readonly d: string }
  | { readonly kind: 'creases'; readonly d: string };

/** A part drawn once, at 1 px per mm; what shows it scales it. */
export interface PartDrawing {
  readonly pieces: readonly PaintedPiece[];
  /** What the light leaves dark on the ground. */
  readonly shadow: string;
  /** Extent of the part without its shadow, px at 1 px per mm. */
  readonly minX: number;
  readonly minY: number;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Number of shades between the darkest and the brightest face. */
export const SHADE_COUNT = 12;
