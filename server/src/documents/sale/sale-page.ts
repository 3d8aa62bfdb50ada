import { drawFormedPicture, tintOf } from '../formed-picture';
import { PdfSheet } from '../pdf-sheet';
import type { DocumentPiece, SaleHead } from './sale-document';
import { handWords, shortHash } from './sale-document';

const PAGE = { widthMm: 210, heightMm: 297 } as const;
const LEFT = 20;
const RIGHT = 190;
const TOP = 279;
const BOTTOM = 20;
const ROW_MM = 25;
const THIN_ROW_MM = 8;
const BELOW_TABLE_MM = 6.5;
const PICTURE_MM = 34;

const TITLE = { font: 'sansBold', sizeMm: 6.2 } as const;
const HEADING = { font: 'sansBold', sizeMm: 3.4 } as const;
const BODY = { font: 'sans', sizeMm: 3.1 } as const;
const BOLD = { font: 'sansBold', sizeMm: 3.1 } as const;
const SMALL = { font: 'sans', sizeMm: 2.5, colour: '#595145' } as const;
const FIGURE = { font: 'mono', sizeMm: 3 } as const;
const HAIR = { widthMm: 0.15, colour: '#C8BFAF' } as const;

/** Columns of a table of sums: words at the left, figures to the right edge of each column. */
export interface SumRow {
  readonly words: string;
  readonly figures: readonly string[];
  readonly isTotal?: boolean;
}

/** A4 pages written from top to bottom: head, paragraphs, pieces with pictures, tables of sums. Runs on by itself. */
export class SalePage {
  private readonly sheet: PdfSheet;
  private y = TOP;

  constructor(
    private readonly head: SaleHead,
    private readonly title: string,
    date: Date,
  ) {
    this.sheet = new PdfSheet({
      title: `${title} ${head.saleNumber}`,
      author: head.shopName,
      subject: `${title} of order ${head.saleNumber}`,
      date,
    });
    this.startPage();
  }

  /** Words in the right half of the head, beside the address: dates and numbers. */
  facts(rows: readonly (readonly [string, string])[]): void {
    let y = TOP - 19;
    for (const [name, value] of rows) {
      this.sheet.text(name, { x: 120, y }, SMALL);
      this.sheet.text(value, { x: RIGHT, y }, { ...BODY, align: 'right' });
      y -= 5;
    }
    this.y = Math.min(this.y, y - 4);
  }

  heading(words: string): void {
    this.need(16);
    this.y -= 4;
    this.sheet.text(words, { x: LEFT, y: this.y }, HEADING);
    this.y -= 6;
  }

  paragraph(words: string, indentMm = 0): void {
    for (const line of this.sheet.wrap(words, RIGHT - LEFT - indentMm, BODY)) {
      this.need(5);
      this.sheet.text(line, { x: LEFT + indentMm, y: this.y }, BODY);
      this.y -= 4.6;
    }
    this.y -= 1.4;
  }

  /** Numbered or dotted lines, each with its own mark. */
  list(entries: readonly string[], mark: (at: number) => string): void {
    for (const [at, entry] of entries.entries()) {
      this.need(6);
      this.sheet.text(mark(at), { x: LEFT, y: this.y }, BOLD);
      this.paragraph(entry, 7);
    }
  }

  /** Things with their picture, revision, hand and finish; hardware in a thin row. */
  pieces(pieces: readonly DocumentPiece[], quantityWords: string): void {
    this.need(ROW_MM + 8);
    this.sheet.text(quantityWords, { x: RIGHT, y: this.y }, { ...SMALL, align: 'right' });
    this.y -= 2.5;
    for (const piece of pieces) {
      if (piece.kind === 'bracket') this.bracketRow(piece);
      else this.hardwareRow(piece);
    }
    this.rule();
    this.y -= BELOW_TABLE_MM;
  }

  private bracketRow(piece: Extract<DocumentPiece, { kind: 'bracket' }>): void {
    this.need(ROW_MM);
    this.rule();
    const middle = this.y - ROW_MM / 2;
    drawFormedPicture(
      this.sheet,
      piece.development,
      {
        centre: { x: LEFT + PICTURE_MM / 2, y: middle },
        widthMm: PICTURE_MM - 4,
        heightMm: ROW_MM - 4,
        largestScale: 0.5,
      },
      tintOf(piece.finishHex),
    );
    const x = LEFT + PICTURE_MM + 4;
    this.sheet.text(piece.name, { x, y: this.y - 7 }, BOLD);
    this.sheet.text(`${piece.number}, ${piece.materialLabel}`, { x, y: this.y - 12 }, SMALL);
    this.sheet.text(piece.finishName, { x, y: this.y - 16.5 }, SMALL);
    this.sheet.text(`fingerprint ${shortHash(piece.hash)}`, { x, y: this.y - 21 }, { ...SMALL, font: 'mono' });
    this.sheet.text(`Revision ${piece.letter}`, { x: 132, y: this.y - 7 }, BOLD);
    this.sheet.text(handWords(piece.hand), { x: 132, y: this.y - 12 }, SMALL);
    this.quantity(piece.quantity, this.y - 7);
    this.y -= ROW_MM;
  }

  private hardwareRow(piece: Extract<DocumentPiece, { kind: 'hardware' }>): void {
    this.need(THIN_ROW_MM);
    this.rule();
    const words = piece.specification === '' ? piece.name : `${piece.name}, ${piece.specification}`;
    this.sheet.text(words, { x: LEFT + PICTURE_MM + 4, y: this.y - 5.4 }, BODY);
    this.quantity(piece.quantity, this.y - 5.4);
    this.y -= THIN_ROW_MM;
  }

  private quantity(quantity: number, y: number): void {
    this.sheet.text(String(quantity), { x: RIGHT, y }, { ...FIGURE, align: 'right' });
  }

  /** Sums under each other. @param columns right edges of the figures, mm from the left of the page */
  sums(names: readonly string[], rows: readonly SumRow[], columns: readonly number[]): void {
    this.need(20);
    for (const [at, name] of names.entries()) {
      const x = columns[at];
      if (x !== undefined) this.sheet.text(name, { x, y: this.y }, { ...SMALL, align: 'right' });
    }
    this.y -= 2.5;
    for (const row of rows) {
      const lines = this.sheet.wrap(row.words, (columns[0] ?? RIGHT) - LEFT - 24, row.isTotal ? BOLD : BODY);
      this.need(6 + 4.4 * lines.length);
      this.rule();
      let y = this.y - 5;
      for (const line of lines) {
        this.sheet.text(line, { x: LEFT, y }, row.isTotal ? BOLD : BODY);
        y -= 4.4;
      }
      for (const [at, figure] of row.figures.entries()) {
        const x = columns[at];
        if (x === undefined) continue;
        const style = row.isTotal ? ({ ...BOLD, align: 'right' } as const) : ({ ...FIGURE, align: 'right' } as const);
        this.sheet.text(figure, { x, y: this.y - 5 }, style);
      }
      this.y -= 2.6 + 4.4 * lines.length;
    }
    this.rule();
    this.y -= BELOW_TABLE_MM;
  }

  finish(): Promise<Buffer> {
    for (let page = 0; page < this.sheet.pageCount; page += 1) {
      this.sheet.turnTo(page);
      const words = `${this.head.shopName}, order ${this.head.saleNumber}`;
      this.sheet.text(words, { x: LEFT, y: BOTTOM - 9 }, SMALL);
      const count = `${page + 1} of ${this.sheet.pageCount}`;
      this.sheet.text(count, { x: RIGHT, y: BOTTOM - 9 }, { ...SMALL, align: 'right' });
    }
    return this.sheet.finish();
  }

  private startPage(): void {
    this.sheet.addPage(PAGE.widthMm, PAGE.heightMm);
    this.sheet.text(this.title, { x: LEFT, y: TOP }, TITLE);
    this.sheet.text(this.head.shopName, { x: RIGHT, y: TOP }, { ...HEADING, align: 'right' });
    this.y = TOP - 8;
    if (this.sheet.pageCount > 1) return;
    const sender = this.head.senderAddress.split('\n').filter((line) => line.trim() !== '');
    for (const [at, line] of sender.entries()) {
      this.sheet.text(line, { x: RIGHT, y: TOP - 4.5 - 3.6 * at }, { ...SMALL, align: 'right' });
    }
    let y = TOP - 19;
    for (const line of this.head.customerLines) {
      this.sheet.text(line, { x: LEFT, y }, BODY);
      y -= 4.8;
    }
    this.y = y - 4;
  }

  private need(heightMm: number): void {
    if (this.y - heightMm < BOTTOM) this.startPage();
  }

  private rule(): void {
    this.sheet.line({ x: LEFT, y: this.y }, { x: RIGHT, y: this.y }, HAIR);
  }
}
