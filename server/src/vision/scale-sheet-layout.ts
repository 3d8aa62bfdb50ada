import { CODES_PER_SHEET } from './marker-codes';
import { CODE_SIDE_CELLS } from './marker-code-search';

export type SheetSize = 'A4' | 'Letter';
export type SheetVariant = 'light' | 'dark';

/** Side of a marker with its dark rim, mm. */
export const MARKER_SIDE_MM = 14;
/** Cells along a marker's side, the dark rim included. */
export const MARKER_SIDE_CELLS = CODE_SIDE_CELLS + 2;
/** Paper-white margin that every marker needs all round, mm: one cell. */
export const QUIET_ZONE_MM = MARKER_SIDE_MM / MARKER_SIDE_CELLS;
/** From the paper's edge to the markers, mm: keeps clear of what common printers cannot print. */
const MARKER_INSET_MM = 11;
/** From the paper's edge to the rulers' base line, mm. */
export const RULER_INSET_MM = 8.4;
export const RULER_LENGTH_MM = 100;
const RULER_HEIGHT_MM = 3.4;

/** A rectangle on the page, mm; x, y is its lower-left corner. */
export interface PageBox {
  readonly x: number;
  readonly y: number;
  readonly widthMm: number;
  readonly heightMm: number;
}

export interface PlacedMarker {
  readonly id: number;
  /** Lower-left corner, mm. */
  readonly x: number;
  readonly y: number;
}

export interface ScaleSheetLayout {
  readonly size: SheetSize;
  readonly variant: SheetVariant;
  readonly widthMm: number;
  readonly heightMm: number;
  readonly markers: readonly PlacedMarker[];
  /** Gaps between markers for words and the mark, in order along the foot of the page, then the head. */
  readonly wordBoxes: readonly PageBox[];
  /** Places of the rulers: along the foot, and along the left side. */
  readonly rulers: readonly (PageBox & { readonly along: 'x' | 'y' })[];
  /** Where a template may lie: nothing is printed here (the dark sheet's ground apart). */
  readonly workArea: PageBox;
}

const PAGE_MM: Readonly<Record<SheetSize, readonly [number, number]>> = { A4: [210, 297], Letter: [215.9, 279.4] };
const COLUMNS = 5;
const ROWS = 8;

/** First marker id of a kind of sheet. */
function firstMarkerId(size: SheetSize, variant: SheetVariant): number {
  return CODES_PER_SHEET * ((size === 'A4' ? 0 : 2) + (variant === 'light' ? 0 : 1));
}

/** The kind of sheet that carries a marker id, or `null` for an id that no sheet uses. */
export function sheetOfMarker(id: number): ScaleSheetLayout | null {
  return SHEETS.find((sheet) => sheet.markers.some((marker) => marker.id === id)) ?? null;
}

/**
 * Where everything stands on a scale sheet: 22 markers round the border, two 100 mm rulers outside them, words in the
 * gaps. One description for the printed page and for the eye that reads it. Page frame: origin lower left, y up, mm.
 */
export function scaleSheetLayout(size: SheetSize, variant: SheetVariant): ScaleSheetLayout {
  const [widthMm, heightMm] = PAGE_MM[size];
  const first = firstMarkerId(size, variant);
  const stepX = (widthMm - 2 * MARKER_INSET_MM - MARKER_SIDE_MM) / (COLUMNS - 1);
  const stepY = (heightMm - 2 * MARKER_INSET_MM - MARKER_SIDE_MM) / (ROWS - 1);
  const markers: PlacedMarker[] = [];
  for (let row = 0; row < ROWS; row++) {
    for (let column = 0; column < COLUMNS; column++) {
      if (row > 0 && row < ROWS - 1 && column > 0 && column < COLUMNS - 1) continue;
      markers.push({
        id: first + markers.length,
        x: MARKER_INSET_MM + column * stepX,
        y: MARKER_INSET_MM + row * stepY,
      });
    }
  }
  const wordBoxes: PageBox[] = [];
  for (const row of [0, ROWS - 1]) {
    for (let column = 0; column + 1 < COLUMNS; column++) {
      wordBoxes.push({
        x: MARKER_INSET_MM + column * stepX + MARKER_SIDE_MM + QUIET_ZONE_MM,
        y: MARKER_INSET_MM + row * stepY,
        widthMm: stepX - MARKER_SIDE_MM - 2 * QUIET_ZONE_MM,
        heightMm: MARKER_SIDE_MM,
      });
    }
  }
  const ring = MARKER_INSET_MM + MARKER_SIDE_MM + QUIET_ZONE_MM;
  const rulerFoot = RULER_INSET_MM - RULER_HEIGHT_MM;
  return {
    size,
    variant,
    widthMm,
    heightMm,
    markers,
    wordBoxes,
    rulers: [
      {
        along: 'x',
        x: (widthMm - RULER_LENGTH_MM) / 2,
        y: rulerFoot,
        widthMm: RULER_LENGTH_MM,
        heightMm: RULER_HEIGHT_MM,
      },
      {
        along: 'y',
        x: rulerFoot,
        y: (heightMm - RULER_LENGTH_MM) / 2,
        widthMm: RULER_HEIGHT_MM,
        heightMm: RULER_LENGTH_MM,
      },
    ],
    workArea: { x: ring, y: ring, widthMm: widthMm - 2 * ring, heightMm: heightMm - 2 * ring },
  };
}

const SHEETS: readonly ScaleSheetLayout[] = [
  scaleSheetLayout('A4', 'light'),
  scaleSheetLayout('A4', 'dark'),
  scaleSheetLayout('Letter', 'light'),
  scaleSheetLayout('Letter', 'dark'),
];
