import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { ShopDeskApi } from '../api/shop-desk-api';

/** The area “Shop” with its pages, and the way to what customers see. */
@Component({
  selector: 'fw-shop-area',
  imports: [RouterLink, RouterLinkActive, RouterOutlet],
  template: `
    <div class="head">
      <h1>Shop</h1>
      @if (settings.value(); as shop) {
        @if (shop.isOpen) {
          <a [routerLink]="['/shop', shop.slug]">See it as customers do</a>
        } @else {
          <p class="fw-soft">The shop is closed: customers don’t see it.</p>
        }
      }
    </div>
    <nav class="fw-tabs" aria-label="Shop">
      <a routerLink="/shop-desk/sales" routerLinkActive ariaCurrentWhenActive="page">Sales</a>
      <a routerLink="/shop-desk/listings" routerLinkActive ariaCurrentWhenActive="page">Listings</a>
      <a routerLink="/shop-desk/questions" routerLinkActive ariaCurrentWhenActive="page"
        >Questions
        @if (waiting() > 0) {
          <ng-container>({{ waiting() }} to answer)</ng-container>
        }
      </a>
      @if (isOwner()) {
        <a routerLink="/shop-desk/books" routerLinkActive ariaCurrentWhenActive="page">Books</a>
        <a routerLink="/shop-desk/settings" routerLinkActive ariaCurrentWhenActive="page">Settings</a>
      }
    </nav>
    <router-outlet />
  `,
  styles: `
    :host {
      display: block;
      width: 100%;
    }

    .head {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 20px;
      align-items: baseline;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class ShopArea {
  private readonly session = inject(SessionApi);
  private readonly api = inject(ShopDeskApi);
  protected readonly isOwner = computed(() => this.session.role() === 'owner');
  protected readonly settings = this.api.settings();
  private readonly questions = this.api.questions();
  protected readonly waiting = computed(
    () => (this.questions.value()?.questions ?? []).filter(({ isAnswered }) => !isAnswered).length,
  );

  constructor() {
    rereadOn(['question-changed'], () => this.questions.reload());
  }
}
