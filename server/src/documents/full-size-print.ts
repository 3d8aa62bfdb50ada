import {
  type PrintPaper,
  type PrintPlan,
  type PrintTile,
  PRINT_FOOT_MM,
  PRINT_MARGIN_MM,
  planPrintTiles,
} from '@foldwright/shared/drawing/print-tiles';
import type { Point } from '@foldwright/shared/geometry/point';
import { cautionsFor } from './cautions';
import { type DocumentInput, documentDate, revisionWords, stockWords } from './document-input';
import { drawFlat, labelBends, labelOpenings } from './flat-view';
import { PdfSheet } from './pdf-sheet';

const BAR_MM = 100;
const BAR = { widthMm: 0.25 } as const;
const WORDS = { font: 'sans', sizeMm: 2.6 } as const;
const SMALL = { font: 'sans', sizeMm: 2.2, colour: '#595145' } as const;

/** A bar of exactly 100 mm with a tick every 10: laid across the page's foot and up its left side. */
function drawScaleBar(sheet: PdfSheet, from: Point, direction: 'across' | 'up'): void {
  const along = (mm: number, aside: number): Point =>
    direction === 'across' ? { x: from.x + mm, y: from.y + aside } : { x: from.x - aside, y: from.y + mm };
  sheet.line(along(0, 0), along(BAR_MM, 0), BAR);
  for (let mm = 0; mm <= BAR_MM; mm += 10) {
    // End ticks stand inside, so that the bar measures 100 mm over everything that is printed of it.
    const inward = mm === 0 ? BAR.widthMm / 2 : mm === BAR_MM ? -BAR.widthMm / 2 : 0;
    sheet.line(along(mm + inward, 0), along(mm + inward, mm % 50 === 0 ? 3 : 1.8), BAR);
  }
}

/** Crosses at the window's corners by which neighbouring sheets are laid over each other. */
function drawCrosses(sheet: PdfSheet, plan: PrintPlan, window: Point): void {
  const inset = plan.overlapMm / 2;
  const xs = [window.x + inset, window.x + plan.windowWidthMm - inset];
  const ys = [window.y + inset, window.y + plan.windowHeightMm - inset];
  for (const x of xs) {
    for (const y of ys) {
      sheet.line({ x: x - 3, y }, { x: x + 3, y }, { widthMm: 0.13, colour: '#C2501A' });
      sheet.line({ x, y: y - 3 }, { x, y: y + 3 }, { widthMm: 0.13, colour: '#C2501A' });
    }
  }
}

/** Small plan of all sheets with this one filled. */
function drawKey(sheet: PdfSheet, plan: PrintPlan, tile: PrintTile, right: Point): void {
  const cell = Math.min(7, 24 / Math.max(plan.columns, plan.rows));
  plan.tiles.forEach((one) => {
    const isThis = one === tile;
    sheet.rectangle(
      { x: right.x - (plan.columns - one.column) * cell, y: right.y + (plan.rows - 1 - one.row) * cell },
      cell,
      cell,
      { widthMm: 0.18, ...(isThis ? { fill: '#2B3F8F' } : {}) },
    );
  });
}

function drawFoot(sheet: PdfSheet, input: DocumentInput, plan: PrintPlan, tile: PrintTile): void {
  const left = PRINT_MARGIN_MM;
  drawScaleBar(sheet, { x: left, y: PRINT_MARGIN_MM + 4 }, 'across');
  sheet.text(
    '100 mm: measure both bars. Print at 100 %, never “fit to page”.',
    { x: left, y: PRINT_MARGIN_MM + 9 },
    WORDS,
  );
  sheet.text(
    `Sheet ${tile.name}, ${plan.tiles.indexOf(tile) + 1} of ${plan.tiles.length} · ${input.partNumber} ${input.partName} · ${revisionWords(input)}`,
    { x: left, y: PRINT_MARGIN_MM + 17 },
    { font: 'sansBold', sizeMm: 3 },
  );
  sheet.text(
    `${stockWords(input)} · flat pattern, face A up${input.hash === null ? '' : ` · ${input.hash.slice(0, 16)}`}`,
    { x: left, y: PRINT_MARGIN_MM + 13 },
    SMALL,
  );
  sheet.text(cautionsFor(input)[0] ?? '', { x: left, y: PRINT_MARGIN_MM - 1 }, { ...SMALL, sizeMm: 1.9 });
  drawKey(sheet, plan, tile, { x: plan.pageWidthMm - PRINT_MARGIN_MM, y: PRINT_MARGIN_MM + 2 });
}

/**
 * The flat pattern at 1:1, tiled over sheets that overlap by 10 mm, each with two 100 mm bars, crosses to lay sheets
 * over each other and a key. The plan of sheets is the same one the application shows before printing.
 */
export async function makeFullSizePrint(
  input: DocumentInput,
  options: { readonly paper: PrintPaper },
): Promise<Buffer> {
  const { flat } = input.development;
  const plan = planPrintTiles(flat.bounds, options.paper);
  const sheet = new PdfSheet({
    title: `${input.partNumber} ${input.partName}, ${revisionWords(input)}, full size`,
    author: input.workshopName,
    subject: `Full-size print on ${options.paper}`,
    date: documentDate(input),
  });
  const window = { x: PRINT_MARGIN_MM, y: PRINT_MARGIN_MM + PRINT_FOOT_MM };
  for (const tile of plan.tiles) {
    sheet.addPage(plan.pageWidthMm, plan.pageHeightMm);
    const view = {
      scale: 1,
      place: (point: Point): Point => ({
        x: window.x + point.x - tile.origin.x,
        y: window.y + point.y - tile.origin.y,
      }),
    };
    sheet.within(window, plan.windowWidthMm, plan.windowHeightMm, () => {
      drawFlat(sheet, flat, view);
      labelBends(sheet, flat, view, 3.2);
      labelOpenings(sheet, flat, view, 2.8);
    });
    sheet.rectangle(window, plan.windowWidthMm, plan.windowHeightMm, {
      widthMm: 0.13,
      colour: '#6F7A82',
      dashMm: [2, 2],
    });
    drawScaleBar(sheet, { x: PRINT_MARGIN_MM - 3.5, y: window.y + 2 }, 'up');
    drawCrosses(sheet, plan, window);
    drawFoot(sheet, input, plan, tile);
  }
  return sheet.finish();
}
