import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Sale } from '@foldwright/shared/contracts/sales';
import { dayWords, momentWords } from '@foldwright/ui/date-text/date-words';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { RouteStrip } from '@foldwright/ui/route-strip/route-strip';
import { newIdempotencyKey } from '../api/api-client';
import { Notices } from '../api/notices';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { ShopDeskApi } from '../api/shop-desk-api';
import { AnswerForm } from './answer-form';
import { ArrivalForm } from './arrival-form';
import { CancelForm } from './cancel-form';
import { ParcelForm } from './parcel-form';
import { RefundForm } from './refund-form';
import { ReturnForm } from './return-form';
import { SaleItems } from './sale-items';
import { saleStrip } from './sale-strip';
import { salePaymentWords, saleStateWords } from './sale-words';

type Desk = 'parcel' | 'arrival' | 'cancel' | 'refund' | 'return';

/** One sale: where it is, what is in it, what to do next, its parcels, its money and what happened. */
@Component({
  selector: 'fw-sale-page',
  imports: [
    AnswerForm,
    ArrivalForm,
    CancelForm,
    FindingSign,
    MatButtonModule,
    MoneyText,
    ParcelForm,
    Pictogram,
    RefundForm,
    ReturnForm,
    RouteStrip,
    RouterLink,
    SaleItems,
  ],
  templateUrl: './sale-page.html',
  styleUrl: './sale-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SalePage {
  private readonly api = inject(ShopDeskApi);
  private readonly notices = inject(Notices);
  private readonly session = inject(SessionApi);
  protected readonly canMake = this.session.canMake;
  protected readonly isOwner = computed(() => this.session.role() === 'owner');

  readonly saleId = input.required<string>();

  protected readonly read = this.api.sale(this.saleId);
  protected readonly sale = this.read.value;
  /** The form that is out on the desk. */
  protected readonly desk = signal<Desk | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly refused = signal<readonly string[]>([]);
  private readonly now = new Date();
  private cutKey = newIdempotencyKey();

  protected readonly strip = computed(() => {
    const sale = this.sale();
    return sale === undefined ? [] : saleStrip(sale, this.now);
  });
  protected readonly words = computed(() => {
    const sale = this.sale();
    if (sale === undefined) return null;
    return {
      placed: dayWords(sale.placedAt, this.now),
      state: saleStateWords(sale.state),
      payment: salePaymentWords(sale.paymentState),
    };
  });
  /** Orders whose brackets are here and not on the shelf yet. */
  protected readonly arrived = computed(() => {
    const sale = this.sale();
    const isWaiting = sale?.items.some(({ beingCut }) => beingCut > 0) === true;
    return isWaiting ? (sale?.cutOrders ?? []).filter(({ state }) => state === 'shipped') : [];
  });
  protected readonly shipments = computed(() =>
    (this.sale()?.shipments ?? []).map((shipment) => ({
      ...shipment,
      sent: dayWords(shipment.shippedAt, this.now),
      arrived: shipment.deliveredAt === null ? null : dayWords(shipment.deliveredAt, this.now),
      slip: this.api.packingSlipUrl(this.saleId(), shipment.id),
    })),
  );
  protected readonly invoice = computed(() => this.api.invoiceUrl(this.saleId()));
  protected readonly events = computed(() =>
    [...(this.sale()?.events ?? [])].reverse().map((event) => ({ ...event, when: momentWords(event.at, this.now) })),
  );
  protected readonly isPaid = computed(() => {
    const state = this.sale()?.paymentState;
    return state !== undefined && state !== 'open' && state !== 'failed';
  });
  protected readonly canTakeBack = computed(
    () => this.sale()?.items.some(({ shipped, returned }) => shipped > returned) === true,
  );

  constructor() {
    rereadOn(['sale-changed', 'order-changed', 'question-changed', 'stock-changed'], () => this.read.reload());
  }

  protected show(desk: Desk): void {
    this.desk.update((open) => (open === desk ? null : desk));
  }

  protected take(sale: Sale): void {
    this.read.set(sale);
    this.desk.set(null);
  }

  protected async cut(): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      const { sale, refused } = await this.api.cutMissing(this.saleId(), this.cutKey);
      this.refused.set(refused.map(({ what, reason }) => `${what}: ${reason}`));
      this.read.set(sale);
      // Only an answer ends a try: one whose answer got lost is, pressed again, the same try.
      this.cutKey = newIdempotencyKey();
    } catch (error) {
      this.notices.showProblem(error);
      this.read.reload();
    } finally {
      this.isBusy.set(false);
    }
  }

  protected async markDelivered(shipmentId: string): Promise<void> {
    await this.change(() => this.api.markDelivered(this.saleId(), shipmentId));
  }

  protected async tryRefundAgain(refundId: string): Promise<void> {
    await this.change(() => this.api.retryRefund(this.saleId(), refundId));
  }

  private async change(call: () => Promise<Sale>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      this.read.set(await call());
    } catch (error) {
      this.notices.showProblem(error);
      this.read.reload();
    } finally {
      this.isBusy.set(false);
    }
  }
}
