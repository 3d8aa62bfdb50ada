import type { Point } from '@foldwright/shared/geometry/point';
import { cautionsFor } from './cautions';
import { type DocumentInput, documentDate, revisionWords } from './document-input';
import { drawDimensions } from './drawing-dimensions';
import { DRAWING_BORDER, DRAWING_PAGE, TITLE_BLOCK_HEIGHT_MM, TITLE_BLOCK_WIDTH_MM, drawFrame } from './drawing-frame';
import { TableColumn } from './drawing-table-column';
import { bendTable, formedSizeTable, openingTable } from './drawing-tables';
import { drawFormedPicture } from './formed-picture';
import { type FlatViewPlace, drawFlat, labelBends, labelOpenings } from './flat-view';
import { PdfSheet } from './pdf-sheet';

/** Scales a drawing may have, largest first. Source: ISO 5455. */
const SCALES = [5, 2, 1, 1 / 2, 1 / 5, 1 / 10, 1 / 20] as const;

const RIGHT_COLUMN_LEFT_MM = DRAWING_PAGE.widthMm - DRAWING_BORDER.otherMm - TITLE_BLOCK_WIDTH_MM;
const NOTES_HEIGHT_MM = 34;
/** Room for the flat view, with its dimensions inside. */
const VIEW = {
  left: DRAWING_BORDER.leftMm + 6,
  bottom: DRAWING_BORDER.otherMm + NOTES_HEIGHT_MM,
  right: RIGHT_COLUMN_LEFT_MM - 6,
  top: DRAWING_PAGE.heightMm - DRAWING_BORDER.otherMm - 6,
} as const;
const DIMENSION_ROOM_MM = 22;

const scaleWords = (scale: number): string => (scale >= 1 ? `${scale}:1` : `1:${Math.round(1 / scale)}`);

function placeFlat(input: DocumentInput): FlatViewPlace {
  const { min, max } = input.development.flat.bounds;
  const roomX = VIEW.right - VIEW.left - DIMENSION_ROOM_MM;
  const roomY = VIEW.top - VIEW.bottom - DIMENSION_ROOM_MM;
  const scale = SCALES.find((one) => (max.x - min.x) * one <= roomX && (max.y - min.y) * one <= roomY) ?? 1 / 50;
  const middle = { x: (min.x + max.x) / 2, y: (min.y + max.y) / 2 };
  const centre = {
    x: (VIEW.left + DIMENSION_ROOM_MM + VIEW.right) / 2,
    y: (VIEW.bottom + DIMENSION_ROOM_MM + VIEW.top) / 2,
  };
  return {
    scale,
    place: (point: Point): Point => ({
      x: centre.x + (point.x - middle.x) * scale,
      y: centre.y + (point.y - middle.y) * scale,
    }),
  };
}

function drawNotes(sheet: PdfSheet, input: DocumentInput): void {
  const style = { font: 'sans', sizeMm: 2.3, colour: '#22201D' } as const;
  const width = VIEW.right - VIEW.left;
  let y = DRAWING_BORDER.otherMm + NOTES_HEIGHT_MM - 5;
  sheet.text('Cautions', { x: VIEW.left, y }, { font: 'sansBold', sizeMm: 2.8 });
  for (const caution of cautionsFor(input)) {
    for (const line of sheet.wrap(caution, width, style)) {
      y -= 3.2;
      if (y < DRAWING_BORDER.otherMm + 1.5) return;
      sheet.text(line, { x: VIEW.left, y }, style);
    }
  }
}

/** The formed part as it should come out, in whatever room the tables left in the right column. */
function drawFormed(sheet: PdfSheet, input: DocumentInput, topMm: number): void {
  const bottom = DRAWING_BORDER.otherMm + TITLE_BLOCK_HEIGHT_MM + 4;
  const height = topMm - bottom;
  if (height < 28) return;
  drawFormedPicture(sheet, input.development, {
    centre: { x: RIGHT_COLUMN_LEFT_MM + TITLE_BLOCK_WIDTH_MM / 2, y: bottom + height / 2 },
    widthMm: TITLE_BLOCK_WIDTH_MM - 10,
    heightMm: height - 4,
    largestScale: 1.2,
  });
  sheet.text(
    'Formed, face A up in the base panel; not to scale',
    { x: RIGHT_COLUMN_LEFT_MM, y: topMm - 1 },
    { font: 'sans', sizeMm: 2.2, colour: '#595145' },
  );
}

/**
 * The part drawing: the blank to scale with fold lines and dimensions, bend table with the source of every K, holes,
 * formed sizes with their spread, the formed part, title block, cautions. A3 landscape; long tables run on to more sheets.
 */
export async function makeDrawing(input: DocumentInput): Promise<Buffer> {
  const sheet = new PdfSheet({
    title: `${input.partNumber} ${input.partName}, ${revisionWords(input)}`,
    author: input.workshopName,
    subject: 'Part drawing, developed blank',
    date: documentDate(input),
  });
  const view = placeFlat(input);
  const startPage = (): void => sheet.addPage(DRAWING_PAGE.widthMm, DRAWING_PAGE.heightMm);
  startPage();
  drawFlat(sheet, input.development.flat, view);
  labelBends(sheet, input.development.flat, view, 2.8);
  labelOpenings(sheet, input.development.flat, view, 2.4);
  drawDimensions(sheet, input.development.flat, view);
  drawNotes(sheet, input);
  const column = new TableColumn(sheet, {
    leftMm: RIGHT_COLUMN_LEFT_MM,
    widthMm: TITLE_BLOCK_WIDTH_MM,
    topMm: DRAWING_PAGE.heightMm - DRAWING_BORDER.otherMm - 6,
    bottomMm: DRAWING_BORDER.otherMm + TITLE_BLOCK_HEIGHT_MM + 4,
    startPage,
  });
  for (const table of [bendTable, openingTable, formedSizeTable]) column.write(table(input.development));
  drawFormed(sheet, input, column.yMm);
  for (let page = 0; page < sheet.pageCount; page += 1) {
    sheet.turnTo(page);
    drawFrame(sheet, input, scaleWords(view.scale), `${page + 1} of ${sheet.pageCount}`);
  }
  return sheet.finish();
}
