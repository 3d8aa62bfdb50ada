import { DOCUMENT, ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { dayWords, momentWords } from '@foldwright/ui/date-text/date-words';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { fitInto } from '@foldwright/ui/formed-preview/fit-into';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { RouteStrip } from '@foldwright/ui/route-strip/route-strip';
import { auditTime, filter, merge } from 'rxjs';
import { newIdempotencyKey } from '../api/api-client';
import { LiveEvents } from '../api/live-events';
import { Notices } from '../api/notices';
import { OrdersApi } from '../api/orders-api';
import { RevisionsApi } from '../api/revisions-api';
import { SessionApi } from '../api/session-api';
import { orderTimeline, waitsFor } from './order-timeline';
import { paymentWords, shortHash, statementWords } from './order-words';

const REREAD_AFTER_MS = 250;
const DRAWING_ROOM_PX = { width: 124, height: 92 };

/** One order: where it is on its road, what it is for, what it costs, what happened; and paying it. */
@Component({
  selector: 'fw-order-page',
  imports: [FindingSign, FormedPreview, MatButtonModule, MoneyText, PartCardFrame, Pictogram, RouteStrip, RouterLink],
  templateUrl: './order-page.html',
  styleUrl: './order-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OrderPage {
  private readonly orders = inject(OrdersApi);
  private readonly notices = inject(Notices);
  private readonly live = inject(LiveEvents);
  private readonly window = inject(DOCUMENT).defaultView;
  protected readonly canMake = inject(SessionApi).canMake;

  readonly orderId = input.required<string>();
  /** How the person comes back from the payment host: `done` or `left`. */
  readonly payment = input<string>();

  private readonly read = this.orders.order(this.orderId);
  protected readonly order = this.read.value;
  protected readonly problem = this.read.problem;
  private readonly revision = inject(RevisionsApi).revision(() => this.order()?.revisionId);
  protected readonly document = computed(() => this.revision.value()?.document ?? null);
  protected readonly madeOf = computed(() => (this.order()?.stock === 'trial' ? 'trial-steel' : 'alloy'));
  protected readonly pxPerMm = computed(() => {
    const document = this.document();
    return document === null ? 1 : fitInto(document, this.madeOf(), DRAWING_ROOM_PX).pxPerMm;
  });

  private readonly now = new Date();
  protected readonly timeline = computed(() => {
    const order = this.order();
    return order === undefined ? [] : orderTimeline(order, this.now);
  });
  protected readonly facts = computed(() => {
    const order = this.order();
    if (order === undefined) return null;
    return {
      placed: dayWords(order.placedAt, this.now),
      statement: statementWords(order.statement),
      payment: paymentWords(order.paymentState),
      waits: waitsFor(order),
      hash: shortHash(order.revisionHash),
      canPay: order.state === 'placed' && order.paymentState !== 'paid',
    };
  });
  protected readonly events = computed(() =>
    [...(this.order()?.events ?? [])]
      .sort((a, b) => b.at.localeCompare(a.at))
      .map((event) => ({ ...event, when: momentWords(event.at, this.now) })),
  );
  /** The host says "paid" to the server, not to the browser: until it has, the page says that it waits. */
  protected readonly awaitsPayment = computed(() => this.payment() === 'done' && this.facts()?.canPay === true);
  protected readonly isBusy = signal(false);
  private checkoutKey = newIdempotencyKey();

  constructor() {
    const changes = this.live.events.pipe(
      filter((event) => event.kind === 'order-changed' && event.orderId === this.orderId()),
    );
    merge(changes, this.live.resumed)
      .pipe(auditTime(REREAD_AFTER_MS), takeUntilDestroyed())
      .subscribe(() => this.read.reload());
  }

  protected async pay(): Promise<void> {
    // A double click arrives before the button is drawn as disabled.
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      const url = await this.orders.openCheckout(this.orderId(), this.checkoutKey);
      this.window?.location.assign(url);
    } catch (error) {
      this.isBusy.set(false);
      // A new try is a new checkout: the answer to the old one is known.
      this.checkoutKey = newIdempotencyKey();
      this.notices.showProblem(error);
    }
  }

  protected async cancel(): Promise<void> {
    const order = this.order();
    if (order === undefined || this.isBusy()) return;
    this.isBusy.set(true);
    try {
      this.read.set(await this.orders.cancel(order.id, order.revision));
    } catch (error) {
      this.notices.showProblem(error);
      this.read.reload();
    } finally {
      this.isBusy.set(false);
    }
  }

  protected readAgain(): void {
    this.read.reload();
  }
}
