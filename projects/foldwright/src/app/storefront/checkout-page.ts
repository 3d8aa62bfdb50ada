import { DOCUMENT, ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import type { Offer } from '@foldwright/shared/contracts/storefront';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { newIdempotencyKey } from '../api/api-client';
import { type ApiProblem, problemFromError } from '../api/api-problem';
import { SessionApi } from '../api/session-api';
import { StorefrontApi } from '../api/storefront-api';
import { CartStore } from './cart-store';
import { COUNTRIES } from './countries';
import { MissingShop } from './missing-shop';
import { offerChanges } from './offer-change';
import { ShopFrame } from './shop-frame';
import { leavesWords } from './stock-words';

/** Address and a last look at what it costs and when it leaves; then the payment host's page. */
@Component({
  selector: 'fw-checkout-page',
  imports: [
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    MissingShop,
    MoneyText,
    ReactiveFormsModule,
    RouterLink,
    ShopFrame,
  ],
  templateUrl: './checkout-page.html',
  styleUrl: './checkout-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CheckoutPage {
  private readonly api = inject(StorefrontApi);
  private readonly cart = inject(CartStore);
  private readonly router = inject(Router);
  private readonly window = inject(DOCUMENT).defaultView;
  private readonly user = inject(SessionApi).user;

  readonly shop = input.required<string>();

  protected readonly front = this.api.front(this.shop);
  protected readonly lines = computed(() => this.cart.lines(this.shop())());
  protected readonly offer = signal<Offer | null>(null);
  protected readonly changes = signal<readonly string[]>([]);
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly countries = COUNTRIES;
  protected readonly form = inject(NonNullableFormBuilder).group({
    email: [this.user()?.email ?? '', [Validators.required, Validators.email]],
    name: [this.user()?.name ?? '', [Validators.required, Validators.maxLength(80)]],
    street: ['', [Validators.required, Validators.maxLength(120)]],
    more: ['', Validators.maxLength(120)],
    postcode: ['', [Validators.required, Validators.maxLength(20)]],
    city: ['', [Validators.required, Validators.maxLength(80)]],
    country: ['IE', Validators.required],
  });
  protected readonly rows = computed(() =>
    (this.offer()?.lines ?? []).map((line) => ({
      ...line,
      finish: finishWords(line.finishId),
      when:
        line.fromShelf === line.quantity
          ? leavesWords(line.leavesInDays)
          : `${line.quantity - line.fromShelf} cut for you first; ${leavesWords(line.leavesInDays)}`,
    })),
  );
  private readonly orderKeys = new Map<string, string>();

  constructor() {
    queueMicrotask(() => void this.price());
  }

  protected async order(): Promise<void> {
    this.form.markAllAsTouched();
    const offer = this.offer();
    if (this.form.invalid || offer === null || this.isBusy()) return;
    this.isBusy.set(true);
    this.problem.set(null);
    const { email, ...address } = this.form.getRawValue();
    const body = { lines: [...this.lines()], offerHash: offer.offerHash, email, address };
    try {
      const { link } = await this.api.place(this.shop(), body, this.orderKey(JSON.stringify(body)));
      this.cart.clear(this.shop());
      await this.goToPayment(link);
    } catch (error) {
      this.isBusy.set(false);
      this.takeFailure(problemFromError(error), offer);
    }
  }

  /** The same for every try of one order: a try whose answer got lost must not become a second one. */
  private orderKey(wish: string): string {
    const key = this.orderKeys.get(wish) ?? newIdempotencyKey();
    this.orderKeys.set(wish, key);
    return key;
  }

  /** The order is placed: should the payment host be away, its own page says so and offers to pay again. */
  private async goToPayment(link: string): Promise<void> {
    try {
      this.window?.location.assign(await this.api.openCheckout(link, newIdempotencyKey()));
    } catch (error) {
      problemFromError(error);
      await this.router.navigate(['/shop/order', link], { queryParams: { payment: 'left' } });
    }
  }

  /** Nobody pays what they did not see: what changed is said, and asked again. */
  private takeFailure(problem: ApiProblem, seen: Offer): void {
    const now = this.api.offerOf(problem);
    if (now === null) {
      this.problem.set(problem);
      return;
    }
    this.changes.set(offerChanges(seen, now));
    this.offer.set(now);
  }

  private async price(): Promise<void> {
    if (this.lines().length === 0) return;
    try {
      this.offer.set(await this.api.price(this.shop(), this.lines()));
    } catch (error) {
      this.problem.set(problemFromError(error));
    }
  }
}
