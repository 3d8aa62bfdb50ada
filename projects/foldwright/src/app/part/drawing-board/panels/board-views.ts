import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';

/** Something that the board can show, or a list that can lie beside it. */
export interface BoardView {
  readonly id: string;
  readonly label: string;
}

/** What the board shows: a few words in a column, the current one under chalk. */
@Component({
  selector: 'fw-board-views',
  template: `
    <ul [attr.aria-label]="label()">
      @for (view of views(); track view.id) {
        <li>
          <button
            type="button"
            [class.current]="view.id === current()"
            [attr.aria-pressed]="view.id === current()"
            (click)="chosen.emit(view.id)"
          >
            {{ view.label }}
          </button>
        </li>
      }
    </ul>
    <ng-content />
  `,
  styleUrl: './board-views.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BoardViews {
  readonly views = input.required<readonly BoardView[]>();
  readonly current = input<string | null>(null);
  readonly label = input('What the board shows');

  readonly chosen = output<string>();
}
