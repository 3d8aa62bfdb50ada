import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Arrival } from '@foldwright/shared/contracts/stock';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { finishWords, lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { fitInto } from '@foldwright/ui/formed-preview/fit-into';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
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

const PICTURE_ROOM_PX = { width: 64, height: 44 };

/** Finished brackets by revision and finish: what lies there, what is kept for sales, what is short; and what happened. */
@Component({
  selector: 'fw-shelf-page',
  imports: [AdjustForm, EmptyBench, FormedPreview, MatButtonModule, ReceiveForm],
  templateUrl: './shelf-page.html',
  styleUrl: './shelf-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShelfPage {
  private readonly api = inject(StockApi);
  protected readonly canMake = inject(SessionApi).canMake;

  protected readonly stock = this.api.stock();
  protected readonly chosen = signal<string | null>(null);
  /** What is being put on the shelf: anything, or what an order made. */
  protected readonly receiving = signal<{ readonly arrival: Arrival | null } | null>(null);
  protected readonly moves = this.api.moves(this.chosen);

  private readonly documents = computed(
    () => new Map((this.stock.value()?.drawings ?? []).map(({ revisionId, document }) => [revisionId, document])),
  );
  protected readonly arrivals = computed(() =>
    (this.stock.value()?.arrivals ?? []).map((arrival) => ({
      arrival,
      name: `${arrival.bracket.partNumber} ${arrival.bracket.partName}`,
      words: `revision ${arrival.bracket.letter}, ${HAND_WORDS[arrival.bracket.hand]}`,
      picture: this.pictureOf(arrival.bracket.revisionId, 'bare'),
    })),
  );
  protected readonly rows = computed(() =>
    (this.stock.value()?.brackets ?? []).map((row) => ({
      ...row,
      name: `${row.bracket.partNumber} ${row.bracket.partName}`,
      finish: finishWords(row.finishId),
      hand: HAND_WORDS[row.bracket.hand],
      picture: this.pictureOf(row.bracket.revisionId, row.finishId),
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
    rereadOn(['stock-changed', 'sale-changed', 'order-changed'], () => this.reload());
  }

  protected choose(positionId: string): void {
    this.chosen.update((chosen) => (chosen === positionId ? null : positionId));
  }

  protected reload(): void {
    this.stock.reload();
    this.moves.reload();
  }

  protected received(): void {
    this.receiving.set(null);
    this.reload();
  }

  private pictureOf(revisionId: string, finishId: string) {
    const document = this.documents().get(revisionId);
    return document === undefined ? null : fitInto(document, lookOfFinish(finishId), PICTURE_ROOM_PX);
  }
}

const signed = (change: number): string => (change > 0 ? `+${change}` : `−${Math.abs(change)}`);
