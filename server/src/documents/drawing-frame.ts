import type { DocumentInput } from './document-input';
import { revisionWords, stockWords } from './document-input';
import type { PdfSheet } from './pdf-sheet';

/** A3 landscape, mm. Source: ISO 216; border widths ISO 5457 (20 on the filing edge, 10 elsewhere). */
export const DRAWING_PAGE = { widthMm: 420, heightMm: 297 } as const;
export const DRAWING_BORDER = { leftMm: 20, otherMm: 10 } as const;
/** Width of the title block. Source: ISO 7200:2004 (180 mm). */
export const TITLE_BLOCK_WIDTH_MM = 180;
export const TITLE_BLOCK_HEIGHT_MM = 48;

const THIN = { widthMm: 0.18 } as const;
const WIDE = { widthMm: 0.5 } as const;
const LABEL = { font: 'sans', sizeMm: 1.9, colour: '#595145' } as const;
const VALUE = { font: 'sansMedium', sizeMm: 2.9 } as const;

interface Cell {
  readonly label: string;
  readonly value: string;
  /** Share of the row's width. */
  readonly share: number;
}

const STATEMENT_WORDS: Readonly<Record<DocumentInput['statement'], string>> = {
  'cut-and-bend-to-our-flat': 'Cut and bend to our flat',
  'formed-sizes-rule': 'Formed sizes rule; the bender develops',
};

function titleRows(input: DocumentInput, scaleWords: string, pageWords: string): readonly (readonly Cell[])[] {
  const { stock, flat } = input.development;
  const grain = input.document.stocks[input.role].grainDirectionDeg;
  return [
    [
      { label: 'Owner', value: input.workshopName, share: 0.42 },
      { label: 'Number', value: input.partNumber, share: 0.2 },
      {
        label: 'Revision',
        value: input.isDraft ? `draft of ${input.revisionLetter}` : input.revisionLetter,
        share: 0.18,
      },
      { label: 'Sheet', value: pageWords, share: 0.2 },
    ],
    [
      { label: 'Title', value: input.partName, share: 0.62 },
      { label: 'Document', value: 'Part drawing, developed blank', share: 0.38 },
    ],
    [
      { label: 'Material', value: stockWords(input), share: 0.42 },
      {
        label: 'Thickness',
        value: `${stock.thicknessMm.toFixed(2)} mm (${(stock.thicknessMm / 25.4).toFixed(4)} in)`,
        share: 0.3,
      },
      { label: 'Grain', value: grain === null ? 'not stated' : `${grain.toFixed(0)}° to +x`, share: 0.28 },
    ],
    [
      {
        label: 'Blank',
        value: `${(flat.bounds.max.x - flat.bounds.min.x).toFixed(1)} × ${(flat.bounds.max.y - flat.bounds.min.y).toFixed(1)} mm`,
        share: 0.28,
      },
      { label: 'Mass', value: massWords(flat.massKg), share: 0.16 },
      { label: 'Scale', value: scaleWords, share: 0.14 },
      { label: 'General tolerances', value: 'ISO 2768-m, bends apart', share: 0.42 },
    ],
    [
      { label: 'Made to', value: STATEMENT_WORDS[input.statement], share: 0.42 },
      {
        label: input.isDraft ? 'Draft' : 'Released',
        value: input.releasedAt?.slice(0, 10) ?? 'not released',
        share: 0.22,
      },
      { label: 'By', value: input.releasedBy ?? '', share: 0.36 },
    ],
    [{ label: 'Hash of the release (SHA-256)', value: input.hash ?? 'a draft has none', share: 1 }],
  ];
}

/** "137 g" under a kilogram, "1.24 kg" above. */
export const massWords = (massKg: number): string =>
  massKg < 1 ? `${Math.round(massKg * 1000)} g` : `${massKg.toFixed(2)} kg`;

/** Border, title block and the strip that says what the lengths are in. `pageWords` like "1 of 2". */
export function drawFrame(sheet: PdfSheet, input: DocumentInput, scaleWords: string, pageWords: string): void {
  const { leftMm, otherMm } = DRAWING_BORDER;
  sheet.rectangle(
    { x: leftMm, y: otherMm },
    DRAWING_PAGE.widthMm - leftMm - otherMm,
    DRAWING_PAGE.heightMm - 2 * otherMm,
    WIDE,
  );
  const left = DRAWING_PAGE.widthMm - otherMm - TITLE_BLOCK_WIDTH_MM;
  const rows = titleRows(input, scaleWords, pageWords);
  const rowHeight = TITLE_BLOCK_HEIGHT_MM / rows.length;
  sheet.rectangle({ x: left, y: otherMm }, TITLE_BLOCK_WIDTH_MM, TITLE_BLOCK_HEIGHT_MM, { ...WIDE, fill: '#FFFFFF' });
  rows.forEach((cells, rowIndex) => {
    const bottom = otherMm + TITLE_BLOCK_HEIGHT_MM - (rowIndex + 1) * rowHeight;
    if (rowIndex > 0) {
      const top = bottom + rowHeight;
      sheet.line({ x: left, y: top }, { x: left + TITLE_BLOCK_WIDTH_MM, y: top }, THIN);
    }
    let x = left;
    for (const cell of cells) {
      const width = cell.share * TITLE_BLOCK_WIDTH_MM;
      if (x > left) sheet.line({ x, y: bottom }, { x, y: bottom + rowHeight }, THIN);
      sheet.text(cell.label, { x: x + 1.5, y: bottom + rowHeight - 2.7 }, LABEL);
      sheet.text(fitted(sheet, cell.value, width - 3), { x: x + 1.5, y: bottom + 1.5 }, VALUE);
      x += width;
    }
  });
  sheet.text(
    `${input.workshopName} · ${input.partNumber} ${revisionWords(input)} · lengths in mm, angles turned from flat · face A up`,
    { x: leftMm, y: otherMm - 4 },
    { font: 'sans', sizeMm: 2.2, colour: '#595145' },
  );
}

/** Shortens text to a width with an ellipsis; nothing runs over its neighbour. */
function fitted(sheet: PdfSheet, text: string, widthMm: number): string {
  if (sheet.textWidthMm(text, VALUE) <= widthMm) return text;
  let shorter = text;
  while (shorter.length > 1 && sheet.textWidthMm(`${shorter}…`, VALUE) > widthMm) shorter = shorter.slice(0, -1);
  return `${shorter}…`;
}
