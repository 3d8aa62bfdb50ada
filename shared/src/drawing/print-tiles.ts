import type { Bounds, Point } from '../geometry/point';

export type PrintPaper = 'A4' | 'Letter';

/** Sheet sizes in mm, portrait. Source: ISO 216 (A4) and ASME Y14.1 (Letter, 8.5 by 11 in). */
export const PAPER_SIZES_MM: Readonly<Record<PrintPaper, { readonly widthMm: number; readonly heightMm: number }>> = {
  A4: { widthMm: 210, heightMm: 297 },
  Letter: { widthMm: 215.9, heightMm: 279.4 },
};

/** Strip that office printers cannot reach, with some in hand (common practice, no source). */
export const PRINT_MARGIN_MM = 12;
/** Room under the drawing for the scale bar and the page's words. */
export const PRINT_FOOT_MM = 30;
/** Neighbouring sheets show the same strip, so that they can be laid over each other and taped. */
export const PRINT_OVERLAP_MM = 10;

/** One sheet of a full-size print. `origin` is the drawing's point at the lower-left corner of the sheet's window. */
export interface PrintTile {
  readonly column: number;
  readonly row: number;
  /** "A1": letter of the row from the top, number of the column from the left. */
  readonly name: string;
  readonly origin: Point;
}

export interface PrintPlan {
  readonly paper: PrintPaper;
  readonly pageWidthMm: number;
  readonly pageHeightMm: number;
  /** Size of the window on each sheet through which the drawing shows at full size. */
  readonly windowWidthMm: number;
  readonly windowHeightMm: number;
  readonly overlapMm: number;
  readonly columns: number;
  readonly rows: number;
  readonly tiles: readonly PrintTile[];
}

const sheetsFor = (extentMm: number, windowMm: number): number =>
  Math.max(1, Math.ceil((extentMm - PRINT_OVERLAP_MM) / (windowMm - PRINT_OVERLAP_MM)));

/** 0 -> A, 25 -> Z, 26 -> AA. */
const rowLetters = (row: number): string =>
  (row >= 26 ? rowLetters(Math.floor(row / 26) - 1) : '') + String.fromCharCode(65 + (row % 26));

/**
 * Lays the sheets of a full-size print over a drawing's bounds (mm): portrait or landscape, whichever takes fewer
 * sheets, the drawing centred over them, rows from the top.
 */
export function planPrintTiles(bounds: Bounds, paper: PrintPaper): PrintPlan {
  const widthMm = bounds.max.x - bounds.min.x;
  const heightMm = bounds.max.y - bounds.min.y;
  const size = PAPER_SIZES_MM[paper];
  const candidates = [
    { pageWidthMm: size.widthMm, pageHeightMm: size.heightMm },
    { pageWidthMm: size.heightMm, pageHeightMm: size.widthMm },
  ].map((page) => {
    const windowWidthMm = page.pageWidthMm - 2 * PRINT_MARGIN_MM;
    const windowHeightMm = page.pageHeightMm - 2 * PRINT_MARGIN_MM - PRINT_FOOT_MM;
    const columns = sheetsFor(widthMm, windowWidthMm);
    const rows = sheetsFor(heightMm, windowHeightMm);
    return { ...page, windowWidthMm, windowHeightMm, columns, rows };
  });
  const best = candidates.reduce((a, b) => (b.columns * b.rows < a.columns * a.rows ? b : a));
  const stepX = best.windowWidthMm - PRINT_OVERLAP_MM;
  const stepY = best.windowHeightMm - PRINT_OVERLAP_MM;
  const coveredWidthMm = best.windowWidthMm + (best.columns - 1) * stepX;
  const coveredHeightMm = best.windowHeightMm + (best.rows - 1) * stepY;
  const left = (bounds.min.x + bounds.max.x - coveredWidthMm) / 2;
  const bottom = (bounds.min.y + bounds.max.y - coveredHeightMm) / 2;
  const tiles: PrintTile[] = [];
  for (let row = 0; row < best.rows; row += 1) {
    for (let column = 0; column < best.columns; column += 1) {
      tiles.push({
        column,
        row,
        name: `${rowLetters(row)}${column + 1}`,
        origin: { x: left + column * stepX, y: bottom + (best.rows - 1 - row) * stepY },
      });
    }
  }
  return { paper, overlapMm: PRINT_OVERLAP_MM, ...best, tiles };
}
