import PDFDocument from 'pdfkit';
import type { Loop } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { type FontSubset, type PlexFont, fontRuns, plexFont } from './plex-fonts';

declare global {
  // The published typings lack the pattern form of `dash` that pdfkit documents.
  namespace PDFKit.Mixins {
    interface PDFVector {
      dash(lengths: readonly number[]): this;
    }
  }
}

const POINTS_PER_MM = 72 / 25.4;

export interface StrokeStyle {
  readonly widthMm: number;
  readonly colour?: string;
  readonly dashMm?: readonly number[];
}

export interface TextStyle {
  readonly font: PlexFont;
  readonly sizeMm: number;
  readonly colour?: string;
  readonly align?: 'left' | 'centre' | 'right';
  /** Turned counter-clockwise about the text's own point. */
  readonly turnDeg?: number;
}

export interface PdfMeta {
  readonly title: string;
  readonly author: string;
  readonly subject: string;
  /** Stands in the file instead of the clock, so that the same revision gives the same bytes. */
  readonly date: Date;
}

/** A PDF whose pages are drawn in mm, origin at the lower-left corner, y up, like the geometry they show. */
export class PdfSheet {
  private readonly document: PDFKit.PDFDocument;
  private readonly chunks: Buffer[] = [];
  private readonly finished: Promise<Buffer>;
  private readonly fonts = new Set<string>();
  private pageHeightMm = 0;
  private pages = 0;

  constructor(meta: PdfMeta) {
    this.document = new PDFDocument({
      autoFirstPage: false,
      bufferPages: true,
      margin: 0,
      info: {
        Title: meta.title,
        Author: meta.author,
        Subject: meta.subject,
        Producer: 'Foldwright',
        Creator: 'Foldwright',
        CreationDate: meta.date,
        ModDate: meta.date,
      },
    });
    this.finished = new Promise((resolve, reject) => {
      this.document.on('data', (chunk: Buffer) => this.chunks.push(chunk));
      this.document.on('end', () => resolve(Buffer.concat(this.chunks)));
      this.document.on('error', reject);
    });
  }

  get pageCount(): number {
    return this.pages;
  }

  addPage(widthMm: number, heightMm: number): void {
    this.document.addPage({ size: [widthMm * POINTS_PER_MM, heightMm * POINTS_PER_MM], margin: 0 });
    this.pageHeightMm = heightMm;
    this.pages += 1;
  }

  /** Goes back to a page made before, for what is known only at the end (page counts). All pages must be of one height. */
  turnTo(page: number): void {
    this.document.switchToPage(page);
  }

  line(from: Point, to: Point, style: StrokeStyle): void {
    this.stroke(style, () => {
      this.document.moveTo(this.x(from), this.y(from)).lineTo(this.x(to), this.y(to));
    });
  }

  rectangle(at: Point, widthMm: number, heightMm: number, style: StrokeStyle & { readonly fill?: string }): void {
    const draw = (): PDFKit.PDFDocument =>
      this.document.rect(
        this.x(at),
        this.y(at) - heightMm * POINTS_PER_MM,
        widthMm * POINTS_PER_MM,
        heightMm * POINTS_PER_MM,
      );
    if (style.fill !== undefined) draw().fill(style.fill);
    if (style.widthMm > 0) this.stroke(style, draw);
  }

  circle(centre: Point, diameterMm: number, style: StrokeStyle): void {
    this.stroke(style, () => this.document.circle(this.x(centre), this.y(centre), (diameterMm / 2) * POINTS_PER_MM));
  }

  polygon(points: readonly Point[], fill: string): void {
    const corners = points.map((point): [number, number] => [this.x(point), this.y(point)]);
    // A hairline of the same colour closes the seams that renderers leave between neighbouring faces.
    this.document
      .lineWidth(0.2)
      .lineJoin('round')
      .polygon(...corners)
      .fillAndStroke(fill, fill);
  }

  /** Closed chain of lines and arcs after `place` has put it on the page (a similarity that keeps orientation). */
  loop(loop: Loop, place: (point: Point) => Point, style: StrokeStyle & { readonly fill?: string }): void {
    const first = loop[0];
    if (!first) return;
    const start = place(first.from);
    const pieces = [`M ${this.x(start)} ${this.y(start)}`];
    for (const segment of loop) {
      const to = place(segment.to);
      if (segment.kind === 'line') {
        pieces.push(`L ${this.x(to)} ${this.y(to)}`);
        continue;
      }
      const from = place(segment.from);
      const centre = place(segment.centre);
      const radius = Math.hypot(from.x - centre.x, from.y - centre.y) * POINTS_PER_MM;
      // Half-way points keep every drawn arc under a half turn, so that the large-arc flag never has to be guessed.
      for (const point of arcWaypoints(from, to, centre, segment.clockwise)) {
        pieces.push(`A ${radius} ${radius} 0 0 ${segment.clockwise ? 1 : 0} ${this.x(point)} ${this.y(point)}`);
      }
    }
    pieces.push('Z');
    const path = pieces.join(' ');
    if (style.fill !== undefined) this.document.path(path).fill(style.fill);
    if (style.widthMm > 0) this.stroke(style, () => this.document.path(path));
  }

  text(text: string, at: Point, style: TextStyle): void {
    const widthMm = this.textWidthMm(text, style);
    const shift = style.align === 'centre' ? -widthMm / 2 : style.align === 'right' ? -widthMm : 0;
    this.document.save();
    this.document.rotate(-(style.turnDeg ?? 0), { origin: [this.x(at), this.y(at)] });
    this.document.fillColor(style.colour ?? '#22201D');
    let x = this.x(at) + shift * POINTS_PER_MM;
    for (const run of fontRuns(text)) {
      this.useFont(style, run.subset);
      this.document.text(run.text, x, this.y(at), { lineBreak: false, baseline: 'alphabetic' });
      x += this.document.widthOfString(run.text);
    }
    this.document.restore();
  }

  textWidthMm(text: string, style: Pick<TextStyle, 'font' | 'sizeMm'>): number {
    return fontRuns(text).reduce((sum, run) => {
      this.useFont(style, run.subset);
      return sum + this.document.widthOfString(run.text) / POINTS_PER_MM;
    }, 0);
  }

  /** Breaks text into lines no wider than given, at spaces; a longer word stays whole on a line of its own. */
  wrap(text: string, widthMm: number, style: Pick<TextStyle, 'font' | 'sizeMm'>): readonly string[] {
    const lines: string[] = [];
    let line = '';
    for (const word of text.split(/\s+/).filter((piece) => piece !== '')) {
      const longer = line === '' ? word : `${line} ${word}`;
      if (line !== '' && this.textWidthMm(longer, style) > widthMm) {
        lines.push(line);
        line = word;
      } else {
        line = longer;
      }
    }
    return line === '' ? lines : [...lines, line];
  }

  /** Draws with everything outside a window hidden. */
  within(at: Point, widthMm: number, heightMm: number, draw: () => void): void {
    this.document.save();
    this.document
      .rect(this.x(at), this.y(at) - heightMm * POINTS_PER_MM, widthMm * POINTS_PER_MM, heightMm * POINTS_PER_MM)
      .clip();
    draw();
    this.document.restore();
  }

  finish(): Promise<Buffer> {
    this.document.end();
    return this.finished;
  }

  private useFont(style: Pick<TextStyle, 'font' | 'sizeMm'>, subset: FontSubset): void {
    const name = `${style.font}-${subset}`;
    if (!this.fonts.has(name)) {
      this.document.registerFont(name, plexFont(style.font, subset));
      this.fonts.add(name);
    }
    this.document.font(name).fontSize(style.sizeMm * POINTS_PER_MM);
  }

  private stroke(style: StrokeStyle, draw: () => void): void {
    this.document.save();
    this.document
      .lineWidth(style.widthMm * POINTS_PER_MM)
      .strokeColor(style.colour ?? '#22201D')
      .lineJoin('round');
    if (style.dashMm) {
      this.document.dash(style.dashMm.map((length) => length * POINTS_PER_MM));
    }
    draw();
    this.document.stroke();
    this.document.restore();
  }

  private x(point: Point): number {
    return point.x * POINTS_PER_MM;
  }

  private y(point: Point): number {
    return (this.pageHeightMm - point.y) * POINTS_PER_MM;
  }
}

/** Points at which an arc is divided into three pieces, each under a half turn; ends with `to`. Equal ends: full circle. */
function arcWaypoints(from: Point, to: Point, centre: Point, clockwise: boolean): readonly Point[] {
  const start = Math.atan2(from.y - centre.y, from.x - centre.x);
  const end = Math.atan2(to.y - centre.y, to.x - centre.x);
  const full = 2 * Math.PI;
  const raw = clockwise ? start - end : end - start;
  const turn = from.x === to.x && from.y === to.y ? full : ((raw % full) + full) % full;
  const radius = Math.hypot(from.x - centre.x, from.y - centre.y);
  const sign = clockwise ? -1 : 1;
  const at = (share: number): Point => ({
    x: centre.x + radius * Math.cos(start + sign * turn * share),
    y: centre.y + radius * Math.sin(start + sign * turn * share),
  });
  return [at(1 / 3), at(2 / 3), to];
}
