import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { FlatPattern } from '@foldwright/shared/bending/development';
import { type PrintPlan } from '@foldwright/shared/drawing/print-tiles';
import { drawingOfFlat } from '../drawing-board/drawing/sheet-drawing';

/** How the flat pattern lies over the sheets of paper: each sheet with its name, the strips that overlap hatched. */
@Component({
  selector: 'fw-print-plan-view',
  templateUrl: './print-plan-view.html',
  styleUrl: './print-plan-view.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PrintPlanView {
  readonly plan = input.required<PrintPlan>();
  readonly flat = input.required<FlatPattern>();

  protected readonly drawing = computed(() => drawingOfFlat(this.flat()));
  protected readonly sheets = computed(() => {
    const { tiles, windowWidthMm, windowHeightMm } = this.plan();
    return tiles.map(({ name, origin }) => ({
      name,
      x: origin.x,
      y: -origin.y - windowHeightMm,
      widthMm: windowWidthMm,
      heightMm: windowHeightMm,
    }));
  });
  protected readonly viewBox = computed(() => {
    const sheets = this.sheets();
    const [left, top] = [Math.min(...sheets.map(({ x }) => x)), Math.min(...sheets.map(({ y }) => y))];
    const right = Math.max(...sheets.map(({ x, widthMm }) => x + widthMm));
    const bottom = Math.max(...sheets.map(({ y, heightMm }) => y + heightMm));
    return `${left - 6} ${top - 6} ${right - left + 12} ${bottom - top + 12}`;
  });
  protected readonly label = computed(() => {
    const { columns, rows, paper } = this.plan();
    return `Plan of the print: ${columns * rows} sheets of ${paper}, ${columns} across and ${rows} down`;
  });
}
