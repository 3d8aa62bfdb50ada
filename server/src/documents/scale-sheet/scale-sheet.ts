import { readFile } from 'node:fs/promises';
import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import PDFDocument from 'pdfkit';
import { CODE_SIDE_CELLS, codeCell } from '../../vision/marker-code-search';
import { MARKER_CODES } from '../../vision/marker-codes';
import {
  MARKER_SIDE_CELLS,
  MARKER_SIDE_MM,
  type PageBox,
  type ScaleSheetLayout,
  scaleSheetLayout,
  type SheetSize,
  type SheetVariant,
} from '../../vision/scale-sheet-layout';
import { drawMark } from './mark';

const POINTS_PER_MM = 72 / 25.4;
/** Fixed, so that the same sheet is the same bytes. */
const CREATION_DATE = new Date(Date.UTC(2026, 0, 1));
const INK = '#000000';
const PAPER = '#ffffff';
/** Neighbouring light cells overlap a little: touching edges leave a hairline in print. */
const SEAM_OVERLAP_MM = 0.2;
const SOFT_INK = '#333333';
/** Ground of the dark sheet: dark enough for white card, and still not a full flood of ink. */
const DARK_GROUND = '#303030';
const DARK_GROUND_INSET_MM = 1;

interface Words {
  readonly title: string;
  readonly lines: readonly string[];
}

function words(layout: ScaleSheetLayout): readonly Words[] {
  const ground = layout.variant === 'light' ? 'for board and metal' : 'for white and pale card';
  return [
    { title: 'Foldwright', lines: [`Scale sheet ${layout.size}, ${layout.variant}`, ground] },
    { title: 'Print at 100 %', lines: ['No fit to page, no scaling.', 'Matt white paper.'] },
    { title: 'Check both rulers', lines: ['They should read 100 mm.', 'If not, type what they read.'] },
    { title: 'Lay the paper flat', lines: ['Tape it down. Keep clear', 'of the markers.'] },
    { title: 'Take the photo', lines: ['From above, all markers in,', 'sharp, even light, no flash.'] },
    { title: 'Press it down', lines: ['The template must touch', 'the paper all round.'] },
    { title: 'Know the thickness', lines: ['Measure the template with', 'callipers and type it in.'] },
    { title: 'Which way is up', lines: ['You will be asked which', 'face the photo shows.'] },
  ];
}

/** The folder of the fonts that ship with the program, looked for upwards from this file. */
function fontFile(family: string, name: string): string {
  for (let folder = __dirname; ; folder = dirname(folder)) {
    const file = join(folder, 'fonts', family, name);
    if (existsSync(file)) return file;
    if (dirname(folder) === folder) throw new Error(`font ${family}/${name} is missing`);
  }
}

function drawMarkers(pdf: PDFKit.PDFDocument, layout: ScaleSheetLayout): void {
  const cell = MARKER_SIDE_MM / MARKER_SIDE_CELLS;
  for (const marker of layout.markers) {
    const code = MARKER_CODES[marker.id];
    if (code === undefined) throw new RangeError(`no code for marker ${marker.id}`);
    const top = layout.heightMm - marker.y - MARKER_SIDE_MM;
    pdf.rect(marker.x, top, MARKER_SIDE_MM, MARKER_SIDE_MM).fill(INK);
    for (let row = 0; row < CODE_SIDE_CELLS; row++) {
      for (let column = 0; column < CODE_SIDE_CELLS; column++) {
        if (!codeCell(code, row, column)) continue;
        const right = column + 1 < CODE_SIDE_CELLS && codeCell(code, row, column + 1) ? SEAM_OVERLAP_MM : 0;
        const below = row + 1 < CODE_SIDE_CELLS && codeCell(code, row + 1, column) ? SEAM_OVERLAP_MM : 0;
        pdf.rect(marker.x + (column + 1) * cell, top + (row + 1) * cell, cell + right, cell);
        pdf.rect(marker.x + (column + 1) * cell, top + (row + 1) * cell, cell, cell + below);
      }
    }
    pdf.fill(PAPER);
  }
}

function drawRuler(pdf: PDFKit.PDFDocument, layout: ScaleSheetLayout, ruler: ScaleSheetLayout['rulers'][number]): void {
  const isAcross = ruler.along === 'x';
  const lengthMm = isAcross ? ruler.widthMm : ruler.heightMm;
  const depthMm = isAcross ? ruler.heightMm : ruler.widthMm;
  pdf.save();
  // From here on: x along the ruler from its zero, y out towards the paper's edge.
  pdf.translate(ruler.x + (isAcross ? 0 : depthMm), layout.heightMm - ruler.y - (isAcross ? depthMm : 0));
  if (!isAcross) pdf.transform(0, -1, -1, 0, 0, 0);
  pdf.lineWidth(0.15).strokeColor(INK);
  pdf.moveTo(0, 0).lineTo(lengthMm, 0);
  for (let mm = 0; mm <= lengthMm; mm++) {
    const tick = mm % 10 === 0 ? depthMm : mm % 5 === 0 ? depthMm * 0.6 : depthMm * 0.35;
    pdf.moveTo(mm, 0).lineTo(mm, tick);
  }
  pdf.stroke();
  pdf.restore();
}

function writeWords(
  pdf: PDFKit.PDFDocument,
  layout: ScaleSheetLayout,
  box: PageBox,
  text: Words,
  marked: boolean,
): void {
  const top = layout.heightMm - box.y - box.heightMm;
  const inset = marked ? 7.5 : 0;
  if (marked) drawMark(pdf, box.x + 0.4, top + 0.6, 6, INK);
  pdf.fillColor(INK).font('title').fontSize(2.7);
  pdf.text(text.title, box.x + 0.4 + inset, top + (marked ? 1.6 : 0.6), { lineBreak: false });
  pdf.fillColor(SOFT_INK).font('body').fontSize(2);
  text.lines.forEach((line, index) => {
    pdf.text(line, box.x + 0.4, top + (marked ? 7.8 : 5) + index * 3, { lineBreak: false });
  });
}

/**
 * The printable scale sheet: markers, two 100 mm rulers and short instructions, all as vectors. The same options give
 * the same bytes.
 *
 * @throws Error when the fonts are not beside the program.
 */
export async function makeScaleSheet(options: { size: SheetSize; variant: SheetVariant }): Promise<Buffer> {
  const layout = scaleSheetLayout(options.size, options.variant);
  const pdf = new PDFDocument({
    size: [layout.widthMm * POINTS_PER_MM, layout.heightMm * POINTS_PER_MM],
    margin: 0,
    info: {
      Title: `Foldwright scale sheet ${layout.size} ${layout.variant}`,
      Creator: 'Foldwright',
      Producer: 'Foldwright',
      CreationDate: CREATION_DATE,
    },
  });
  const chunks: Buffer[] = [];
  const done = new Promise<Buffer>((resolve, reject) => {
    pdf.on('data', (chunk: Buffer) => chunks.push(chunk));
    pdf.on('end', () => resolve(Buffer.concat(chunks)));
    pdf.on('error', reject);
  });
  pdf.registerFont('title', await readFile(fontFile('ibm-plex-sans', 'ibm-plex-sans-latin-600-normal.woff')));
  pdf.registerFont('body', await readFile(fontFile('ibm-plex-sans', 'ibm-plex-sans-latin-400-normal.woff')));
  pdf.scale(POINTS_PER_MM);
  if (layout.variant === 'dark') {
    const { x, y, widthMm, heightMm } = groundOfDarkSheet(layout);
    pdf.rect(x, layout.heightMm - y - heightMm, widthMm, heightMm).fill(DARK_GROUND);
  }
  drawMarkers(pdf, layout);
  for (const ruler of layout.rulers) drawRuler(pdf, layout, ruler);
  const texts = words(layout);
  layout.wordBoxes.forEach((box, index) => {
    const text = texts[index];
    if (text) writeWords(pdf, layout, box, text, index === 0);
  });
  pdf.end();
  return done;
}

function groundOfDarkSheet(layout: ScaleSheetLayout): PageBox {
  const { x, y, widthMm, heightMm } = layout.workArea;
  const inset = DARK_GROUND_INSET_MM;
  return { x: x + inset, y: y + inset, widthMm: widthMm - 2 * inset, heightMm: heightMm - 2 * inset };
}
