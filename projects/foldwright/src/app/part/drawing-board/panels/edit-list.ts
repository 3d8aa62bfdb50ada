import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { EditHistory } from '../../edit-history';

interface EditRow {
  readonly id: string | null;
  readonly label: string;
  readonly note: string;
  readonly state: 'done' | 'now' | 'undone';
}

/** One's own edits in order: a row is a place to go back or forward to. The whole history by keyboard. */
@Component({
  selector: 'fw-edit-list',
  templateUrl: './edit-list.html',
  styleUrl: './edit-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EditList {
  readonly history = input.required<EditHistory>();
  readonly canEdit = input(true);

  /** The step to stand at; null = before the first. */
  readonly chosen = output<string | null>();

  protected readonly rows = computed<readonly EditRow[]>(() => {
    const { past, future } = this.history();
    const stuck = (isStuck: boolean): string => (isStuck ? 'changed by somebody else since' : '');
    const start: EditRow = { id: null, label: 'As you found it', note: '', state: past.length === 0 ? 'now' : 'done' };
    const done = past.map(({ id, label, isStuck }, index): EditRow => {
      return { id, label, note: stuck(isStuck), state: index === past.length - 1 ? 'now' : 'done' };
    });
    const undone = future.map(({ id, label, isStuck }): EditRow => ({
      id,
      label,
      note: stuck(isStuck),
      state: 'undone',
    }));
    return [start, ...done, ...undone];
  });
}
