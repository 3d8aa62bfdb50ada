import { ChangeDetectionStrategy, Component } from '@angular/core';

/** How a photo is taken, sketched: the sheet, the template on it, one photo from above. */
@Component({
  selector: 'fw-sheet-sketch',
  templateUrl: './sheet-sketch.html',
  styleUrl: './sheet-sketch.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SheetSketch {
  /** Corners of the markers that are printed round the edge. */
  protected readonly markers = [
    ...[-12.6, 64.4, 141.3, 218.3, 295.2, 372.2, 449.2, 526.1].flatMap((x) => [
      { x, y: 78.9 },
      { x, y: 442.5 },
    ]),
    ...[169.8, 260.7, 351.6].flatMap((y) => [
      { x: -12.6, y },
      { x: 526.1, y },
    ]),
  ];
}
