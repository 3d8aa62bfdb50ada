import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { StockApi } from '../api/stock-api';
import { AdjustForm } from './adjust-form';
import { ReceiveForm } from './receive-form';

const HAND_WORDS = { either: 'one hand', left: 'left hand', right: 'right hand' } as const;
const MOVE_WORDS = {
  received: 'came in',
  adjusted: 'corrected',
  reserved: 'kept for a sale',
  released: 'free again',
  shipped: 'sent',
  returned: 'came back',
} as const;

/** Finished brackets by revision and finish: what lies there, what is kept for sales, what is short; and what happened. */
@Component({
  selector: 'fw-shelf-page',
  imports: [AdjustForm, EmptyBench, MatButtonModule, ReceiveForm],
  templateUrl: './shelf-page.html',
  styleUrl: './shelf-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShelfPage {
  private readonly api = inject(StockApi);
  protected readonly canMake = inject(SessionApi).canMake;

  protected readonly stock = this.api.stock();
  protected readonly chosen = signal<string | null>(null);
  protected readonly isReceiving = signal(false);
  protected readonly moves = this.api.moves(this.chosen);

  protected readonly rows = computed(() =>
    (this.stock.value()?.brackets ?? []).map((row) => ({
      ...row,
      name: `${row.bracket.partNumber} ${row.bracket.partName}`,
      finish: finishWords(row.finishId),
      hand: HAND_WORDS[row.bracket.hand],
    })),
  );
  protected readonly chosenRow = computed(
    () => this.rows().find(({ positionId }) => positionId === this.chosen()) ?? null,
  );
  private readonly now = new Date();
  protected readonly history = computed(() =>
    (this.moves.value()?.moves ?? []).map((move) => ({
      ...move,
      when: momentWords(move.at, this.now),
      words: MOVE_WORDS[move.kind],
      change: signed(move.onHandChange === 0 ? move.reservedChange : move.onHandChange),
    })),
  );

  constructor() {
    rereadOn(['stock-changed', 'sale-changed'], () => this.reload());
  }

  protected choose(positionId: string): void {
    this.chosen.update((chosen) => (chosen === positionId ? null : positionId));
  }

  protected reload(): void {
    this.stock.reload();
    this.moves.reload();
  }

  protected received(): void {
    this.isReceiving.set(false);
    this.reload();
  }
}

const signed = (change: number): string => (change > 0 ? `+${change}` : `−${Math.abs(change)}`);
