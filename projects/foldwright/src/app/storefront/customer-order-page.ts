import { DOCUMENT, ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import { dayWords, momentWords } from '@foldwright/ui/date-text/date-words';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { finishWords, lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { fitInto } from '@foldwright/ui/formed-preview/fit-into';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { RouteStrip } from '@foldwright/ui/route-strip/route-strip';
import { interval } from 'rxjs';
import { newIdempotencyKey } from '../api/api-client';
import { Notices } from '../api/notices';
import { StorefrontApi } from '../api/storefront-api';
import { MissingShop } from './missing-shop';
import { orderStrip } from './order-strip';
import { parcelsOf } from './order-parcels';
import { QuestionThread } from './question-thread';
import { ShopFrame } from './shop-frame';

/** Nobody is signed in here, so there is no stream: the page looks again by itself, quickly while money is under way. */
const LOOK_EVERY_MS = 3000;
const LOOKS_WHEN_QUIET = 10;
const DRAWING_ROOM_PX = { width: 104, height: 70 };
const HAND_WORDS = { either: 'one hand', left: 'left hand', right: 'right hand' } as const;

/** A customer's order behind its private link: where it is, what is in which parcel, and questions about fit beside it. */
@Component({
  selector: 'fw-customer-order-page',
  imports: [
    FindingSign,
    FormedPreview,
    MatButtonModule,
    MissingShop,
    MoneyText,
    PartCardFrame,
    Pictogram,
    QuestionThread,
    RouteStrip,
    ShopFrame,
  ],
  templateUrl: './customer-order-page.html',
  styleUrl: './customer-order-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CustomerOrderPage {
  private readonly api = inject(StorefrontApi);
  private readonly notices = inject(Notices);
  private readonly window = inject(DOCUMENT).defaultView;

  readonly link = input.required<string>();
  /** How the customer comes back from the payment host: `done` or `left`. */
  readonly payment = input<string>();

  protected readonly read = this.api.order(this.link);
  protected readonly order = this.read.value;
  protected readonly isBusy = signal(false);
  private readonly now = new Date();
  private checkoutKey = newIdempotencyKey();

  protected readonly strip = computed(() => {
    const order = this.order();
    return order === undefined ? [] : orderStrip(order, this.now);
  });
  protected readonly placed = computed(() => dayWords(this.order()?.placedAt ?? '', this.now));
  protected readonly parcels = computed(() => {
    const order = this.order();
    if (order === undefined) return [];
    return parcelsOf(order, this.now).map((parcel) => ({
      ...parcel,
      rows: parcel.rows.map(({ item, quantity, note }) => ({ ...describe(item), quantity, state: note })),
    }));
  });
  protected readonly events = computed(() =>
    [...(this.order()?.events ?? [])].reverse().map((event) => ({ ...event, when: momentWords(event.at, this.now) })),
  );
  protected readonly thread = computed(() => this.order()?.questions[0] ?? null);
  protected readonly fittingSheet = computed(() => this.api.fittingSheetUrl(this.link()));
  protected readonly invoice = computed(() => this.api.invoiceUrl(this.link()));
  protected readonly awaitsPayment = computed(() => this.payment() === 'done' && this.order()?.canPay === true);

  constructor() {
    interval(LOOK_EVERY_MS)
      .pipe(takeUntilDestroyed())
      .subscribe((count) => {
        const order = this.order();
        const isOver = order === undefined || order.state === 'cancelled' || order.state === 'delivered';
        if (this.window?.document.visibilityState === 'hidden') return;
        if (this.awaitsPayment() || (!isOver && count % LOOKS_WHEN_QUIET === 0)) this.read.reload();
      });
  }

  protected async pay(): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      this.window?.location.assign(await this.api.openCheckout(this.link(), this.checkoutKey));
    } catch (error) {
      this.isBusy.set(false);
      this.checkoutKey = newIdempotencyKey();
      this.notices.showProblem(error);
      this.read.reload();
    }
  }

  protected async cancel(): Promise<void> {
    const order = this.order();
    if (order === undefined || this.isBusy()) return;
    this.isBusy.set(true);
    try {
      this.read.set(await this.api.cancel(this.link(), order.revision));
    } catch (error) {
      this.notices.showProblem(error);
      this.read.reload();
    } finally {
      this.isBusy.set(false);
    }
  }

  protected readonly ask = async (text: string, key: string): Promise<void> => {
    this.read.set(await this.api.askOnOrder(this.link(), text, key));
  };
}

function describe({ id, what }: CustomerOrder['items'][number]) {
  if (what.kind === 'hardware') {
    return { id, name: what.name, note: what.specification, letter: null, hand: null, hash: null, picture: null };
  }
  return {
    id,
    name: what.partName,
    note: `${finishWords(what.finishId).toLowerCase()}, ${what.materialLabel}`,
    letter: what.letter,
    hand: HAND_WORDS[what.hand],
    hash: what.hash.slice(0, 12),
    picture: fitInto(what.document, lookOfFinish(what.finishId), DRAWING_ROOM_PX),
  };
}
