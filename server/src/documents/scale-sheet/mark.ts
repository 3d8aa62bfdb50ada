const MARK_BOX = 32;
const STEM =
  'M5 6.7A1.7 1.7 0 0 1 6.7 5H13v10.5h8.3A1.7 1.7 0 0 1 23 17.2v4.6a1.7 1.7 0 0 1-1.7 1.7H13v5.3a1.7 1.7 0 0 1-1.7 1.7H6.7A1.7 1.7 0 0 1 5 28.8z';
const FOLDED_ARM = 'M14.4 4.6 27.7.7A1 1 0 0 1 29 1.7v6.1a1.2 1.2 0 0 1-.9 1.2L14.4 13z';

/** Draws the mark in one colour: top-left corner and side in the document's current unit. */
export function drawMark(pdf: PDFKit.PDFDocument, x: number, y: number, side: number, colour: string): void {
  pdf.save();
  pdf.translate(x, y).scale(side / MARK_BOX);
  pdf.path(STEM).fill(colour);
  pdf.path(FOLDED_ARM).fill(colour);
  pdf.circle(18.2, 19.5, 1.7).fill('#ffffff');
  pdf.restore();
}
