import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { CartLine, Offer } from '@foldwright/shared/contracts/storefront';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { problemFromError, type ApiProblem } from '../api/api-problem';
import { StorefrontApi } from '../api/storefront-api';
import { CartStore } from './cart-store';
import { MissingShop } from './missing-shop';
import { QuantityField } from './quantity-field';
import { ShopFrame } from './shop-frame';
import { leavesWords } from './stock-words';

/** What somebody wants to buy, as the shop prices it now. */
@Component({
  selector: 'fw-cart-page',
  imports: [MatButtonModule, MissingShop, MoneyText, QuantityField, RouterLink, ShopFrame],
  templateUrl: './cart-page.html',
  styleUrl: './cart-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CartPage {
  private readonly api = inject(StorefrontApi);
  private readonly cart = inject(CartStore);

  readonly shop = input.required<string>();

  protected readonly front = this.api.front(this.shop);
  protected readonly lines = computed(() => this.cart.lines(this.shop())());
  protected readonly offer = signal<Offer | null>(null);
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly rows = computed(() =>
    (this.offer()?.lines ?? []).map((line) => ({
      ...line,
      finish: finishWords(line.finishId),
      when:
        line.fromShelf === line.quantity
          ? `from the shelf, ${leavesWords(line.leavesInDays)}`
          : line.fromShelf === 0
            ? `cut for you, ${leavesWords(line.leavesInDays)}`
            : `${line.fromShelf} from the shelf, the rest is cut for you and ${leavesWords(line.leavesInDays)}`,
    })),
  );

  constructor() {
    // Every change of the cart is priced anew; only the newest answer counts.
    effect(() => {
      const lines = this.lines();
      const shop = this.shop();
      untracked(() => void this.price(shop, lines));
    });
  }

  protected change(line: CartLine, quantity: number): void {
    this.cart.change(this.shop(), line, quantity);
  }

  private async price(shop: string, lines: readonly CartLine[]): Promise<void> {
    if (lines.length === 0) {
      this.offer.set(null);
      return;
    }
    try {
      const offer = await this.api.price(shop, lines);
      if (this.lines() === lines) this.offer.set(offer);
      this.problem.set(null);
    } catch (error) {
      this.problem.set(problemFromError(error));
    }
  }
}
