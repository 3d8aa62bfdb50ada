import type { FlatPattern } from '@foldwright/shared/bending/development';
import type { Point } from '@foldwright/shared/geometry/point';
import type { FlatViewPlace } from './flat-view';
import type { PdfSheet } from './pdf-sheet';

const LINE = { widthMm: 0.13, colour: '#22201D' } as const;
const FIRST_ROW_MM = 9;
const ROW_STEP_MM = 8;
const EXTENSION_GAP_MM = 1.5;
const TICK_MM = 1.4;
const TEXT_MM = 3;

/** Positions along an axis that a chain of dimensions runs over: the blank's ends and the fold lines square to it. */
function stationsAlong(flat: FlatPattern, axis: 'x' | 'y'): readonly number[] {
  const other = axis === 'x' ? 'y' : 'x';
  const folds = flat.bends.flatMap((bend) => {
    const line = bend.centreLines[0];
    if (!line) return [];
    const run = Math.abs(line.to[axis] - line.from[axis]);
    const across = Math.abs(line.to[other] - line.from[other]);
    return run < across * 1e-6 ? [line.from[axis]] : [];
  });
  const all = [flat.bounds.min[axis], ...folds, flat.bounds.max[axis]].sort((a, b) => a - b);
  return all.filter((value, index) => index === 0 || value - (all[index - 1] ?? value) > 0.005);
}

/** Dimension row between two points on the page, ticks oblique, figure in the middle above the line. */
function drawDimension(sheet: PdfSheet, from: Point, to: Point, valueMm: number): void {
  sheet.line(from, to, LINE);
  for (const end of [from, to]) {
    sheet.line(
      { x: end.x - TICK_MM / 2, y: end.y - TICK_MM / 2 },
      { x: end.x + TICK_MM / 2, y: end.y + TICK_MM / 2 },
      { widthMm: 0.25 },
    );
  }
  const upright = Math.abs(to.x - from.x) < Math.abs(to.y - from.y);
  const middle = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
  const at = upright ? { x: middle.x - 0.9, y: middle.y } : { x: middle.x, y: middle.y + 0.9 };
  sheet.text(valueMm.toFixed(2), at, {
    font: 'monoItalic',
    sizeMm: TEXT_MM,
    align: 'centre',
    turnDeg: upright ? 90 : 0,
  });
}

/**
 * Chains over fold lines and the overall size, below and left of the blank, from its own edges: what a person sets out
 * with a rule. Fold lines at an angle are left to the bend table and the full-size print.
 */
export function drawDimensions(sheet: PdfSheet, flat: FlatPattern, view: FlatViewPlace): void {
  const low = view.place(flat.bounds.min);
  const xs = stationsAlong(flat, 'x');
  const ys = stationsAlong(flat, 'y');
  drawChain(sheet, xs, (value, row) => ({ x: view.place({ x: value, y: 0 }).x, y: low.y - row }));
  drawChain(sheet, ys, (value, row) => ({ x: low.x - row, y: view.place({ x: 0, y: value }).y }));
}

function drawChain(sheet: PdfSheet, stations: readonly number[], at: (value: number, rowMm: number) => Point): void {
  const first = stations[0];
  const last = stations.at(-1);
  if (first === undefined || last === undefined) return;
  const isChain = stations.length > 2;
  const overallRow = isChain ? FIRST_ROW_MM + ROW_STEP_MM : FIRST_ROW_MM;
  for (const value of stations) {
    const isEnd = value === first || value === last;
    sheet.line(at(value, EXTENSION_GAP_MM), at(value, (isEnd ? overallRow : FIRST_ROW_MM) + 1.5), LINE);
  }
  if (isChain) {
    stations.slice(1).forEach((value, index) => {
      const before = stations[index] ?? value;
      drawDimension(sheet, at(before, FIRST_ROW_MM), at(value, FIRST_ROW_MM), value - before);
    });
  }
  drawDimension(sheet, at(first, overallRow), at(last, overallRow), last - first);
}
