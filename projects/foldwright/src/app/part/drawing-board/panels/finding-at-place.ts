import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { Finding, Mend } from '@foldwright/shared/rules/finding';
import { FindingNote } from '@foldwright/ui/finding-note/finding-note';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import type { BoardMark } from '../canvas/board-overlay';

/** A finding as a note on the bench beside the place it speaks of, with its mend. */
@Component({
  selector: 'fw-finding-at-place',
  imports: [FindingNote, Pictogram],
  template: `
    <div class="note" [style.--x.px]="at()?.xPx ?? 0" [style.--y.px]="at()?.yPx ?? 0">
      <fw-finding-note [finding]="finding()" [canMend]="canMend()" (mended)="mended.emit($event)" />
      <button type="button" aria-label="Put this note away" (click)="closed.emit()">
        <fw-pictogram name="close" />
      </button>
    </div>
  `,
  styleUrl: './finding-at-place.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FindingAtPlace {
  readonly finding = input.required<Finding>();
  readonly marks = input.required<readonly BoardMark[]>();
  readonly canMend = input(true);

  readonly mended = output<Mend>();
  readonly closed = output<void>();

  protected readonly at = computed(() => this.marks().find((mark) => mark.id === this.finding().id) ?? null);
}
