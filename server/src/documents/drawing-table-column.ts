import type { DrawingTable } from './drawing-tables';
import type { PdfSheet, TextStyle } from './pdf-sheet';

export interface ColumnPlace {
  readonly leftMm: number;
  readonly widthMm: number;
  readonly topMm: number;
  readonly bottomMm: number;
  /** Opens the next sheet when the column is full. */
  readonly startPage: () => void;
}

const HEAD: Omit<TextStyle, 'align'> = { font: 'sansBold', sizeMm: 3 };
const LABEL: Omit<TextStyle, 'align'> = { font: 'sans', sizeMm: 2.1, colour: '#595145' };
const CELL: Omit<TextStyle, 'align'> = { font: 'mono', sizeMm: 2.5 };
const WORDS: Omit<TextStyle, 'align'> = { font: 'sans', sizeMm: 2.5 };
const NOTE: Omit<TextStyle, 'align'> = { font: 'sans', sizeMm: 2, colour: '#595145' };
const NOTE_LINE_MM = 2.8;
const ROW_MM = 4.4;
const RULE = { widthMm: 0.13, colour: '#6F7A82' } as const;

/** Writes tables one under another and carries on on the next sheet where one is full. */
export class TableColumn {
  private y: number;

  constructor(
    private readonly sheet: PdfSheet,
    private readonly place: ColumnPlace,
  ) {
    this.y = place.topMm;
  }

  /** Top of what is still free on the current sheet, mm. */
  get yMm(): number {
    return this.y;
  }

  write(table: DrawingTable): void {
    this.makeRoom(4 * ROW_MM);
    this.writeHead(table, table.title);
    for (const row of table.rows) {
      const noteLines = row.note === null ? [] : this.sheet.wrap(row.note, this.place.widthMm - 4, NOTE);
      const height = ROW_MM + noteLines.length * NOTE_LINE_MM;
      if (this.makeRoom(height)) this.writeHead(table, `${table.title}, continued`);
      this.y -= ROW_MM;
      this.writeCells(table, row.cells);
      for (const line of noteLines) {
        this.y -= NOTE_LINE_MM;
        this.sheet.text(line, { x: this.place.leftMm + 4, y: this.y + 1 }, NOTE);
      }
      this.rule();
    }
    if (table.foot !== null) {
      for (const line of this.sheet.wrap(table.foot, this.place.widthMm, NOTE)) {
        this.makeRoom(NOTE_LINE_MM);
        this.y -= NOTE_LINE_MM + 0.4;
        this.sheet.text(line, { x: this.place.leftMm, y: this.y }, NOTE);
      }
    }
    this.y -= 5;
  }

  /** Whether a new sheet had to be opened. */
  private makeRoom(heightMm: number): boolean {
    if (this.y - heightMm >= this.place.bottomMm) return false;
    this.place.startPage();
    this.y = this.place.topMm;
    return true;
  }

  private writeHead(table: DrawingTable, title: string): void {
    this.y -= 3;
    this.sheet.text(title, { x: this.place.leftMm, y: this.y }, HEAD);
    if (table.rows.length === 0) return;
    this.y -= ROW_MM;
    this.eachColumn(table, (column, x) =>
      this.sheet.text(column.label, { x, y: this.y + 0.6 }, { ...LABEL, align: column.align }),
    );
    this.rule();
  }

  private writeCells(table: DrawingTable, cells: readonly string[]): void {
    this.eachColumn(table, (column, x, index) => {
      const style = column.align === 'right' || (index === 0 && column.isWords !== true) ? CELL : WORDS;
      this.sheet.text(cells[index] ?? '', { x, y: this.y + 1 }, { ...style, align: column.align });
    });
  }

  private eachColumn(
    table: DrawingTable,
    draw: (column: DrawingTable['columns'][number], x: number, index: number) => void,
  ): void {
    let left = this.place.leftMm;
    table.columns.forEach((column, index) => {
      draw(column, column.align === 'right' ? left + column.widthMm - 1 : left + 1, index);
      left += column.widthMm;
    });
  }

  private rule(): void {
    this.sheet.line(
      { x: this.place.leftMm, y: this.y },
      { x: this.place.leftMm + this.place.widthMm, y: this.y },
      RULE,
    );
  }
}
