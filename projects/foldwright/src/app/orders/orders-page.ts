import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { auditTime, filter, merge } from 'rxjs';
import { LiveEvents } from '../api/live-events';
import { OrdersApi } from '../api/orders-api';
import { paymentWords, stateWords } from './order-words';

const REREAD_AFTER_MS = 400;

/** Orders of the workshop to the cutting service, newest first. */
@Component({
  selector: 'fw-orders-page',
  imports: [EmptyBench, MatButtonModule, MoneyText, RouterLink],
  templateUrl: './orders-page.html',
  styleUrl: './orders-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class OrdersPage {
  private readonly live = inject(LiveEvents);
  protected readonly list = inject(OrdersApi).list();

  private readonly now = new Date();
  protected readonly rows = computed(() =>
    (this.list.value()?.orders ?? []).map((order) => ({
      order,
      state: stateWords(order.state),
      payment: paymentWords(order.paymentState),
      placed: dayWords(order.placedAt, this.now),
      isOpen: order.state === 'placed',
    })),
  );

  constructor() {
    merge(this.live.events.pipe(filter(({ kind }) => kind === 'order-changed')), this.live.resumed)
      .pipe(auditTime(REREAD_AFTER_MS), takeUntilDestroyed())
      .subscribe(() => this.list.reload());
  }
}
