import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Sale } from '@foldwright/shared/contracts/sales';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { StockApi } from '../api/stock-api';
import { OnceCall } from '../api/once-call';

/** Put on the shelf what the cutting service made for a sale, in the finish it was sold in. */
@Component({
  selector: 'fw-arrival-form',
  imports: [MatButtonModule],
  template: `
    <section class="fw-paper">
      <h3>What was cut is here</h3>
      <p class="fw-read">Brackets arrive bare. Put them on the shelf in the finish they have when they lie there.</p>
      @for (row of rows(); track row.key) {
        <div class="line">
          <span>{{ row.words }}</span>
          <button matButton="filled" type="button" [disabled]="call.isBusy()" (click)="put(row)">
            Put {{ row.quantity }} on the shelf
          </button>
        </div>
      } @empty {
        <p>All of it is on the shelf.</p>
      }
    </section>
  `,
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ArrivalForm {
  private readonly api = inject(StockApi);
  protected readonly call = new OnceCall();

  readonly sale = input.required<Sale>();
  readonly orders = input.required<Sale['cutOrders']>();
  readonly done = output<void>();

  private readonly shelved = signal<ReadonlySet<string>>(new Set());
  protected readonly rows = computed(() =>
    this.orders().flatMap((order) =>
      this.sale().items.flatMap((item) => {
        const { what, beingCut } = item;
        const key = `${order.orderId} ${item.id}`;
        if (what.kind !== 'bracket' || beingCut === 0 || what.partName !== order.partName) return [];
        if (this.shelved().has(key)) return [];
        const words = `${what.partName}, revision ${what.letter}, ${finishWords(what.finishId).toLowerCase()}; order ${order.number}`;
        const { revisionId, finishId } = what;
        return [{ key, words, quantity: beingCut, revisionId, finishId, orderId: order.orderId }];
      }),
    ),
  );

  protected async put({
    key,
    quantity,
    revisionId,
    finishId,
    orderId,
  }: ReturnType<ArrivalForm['rows']>[number]): Promise<void> {
    const what = { kind: 'bracket', revisionId, finishId } as const;
    const answer = await this.call.run((once) => this.api.receive({ what, quantity, orderId, reason: '' }, once));
    if (answer === undefined) return;
    this.shelved.update((put) => new Set([...put, key]));
    if (this.rows().length === 0) this.done.emit();
  }
}
