import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { SessionApi } from '../api/session-api';

/** The area “Stock & kits” with its pages. */
@Component({
  selector: 'fw-stock-area',
  imports: [RouterLink, RouterLinkActive, RouterOutlet],
  template: `
    <h1>Stock &amp; kits</h1>
    <nav class="fw-tabs" aria-label="Stock and kits">
      <a routerLink="/stock" routerLinkActive [routerLinkActiveOptions]="{ exact: true }" ariaCurrentWhenActive="page"
        >Shelf</a
      >
      <a routerLink="/stock/hardware" routerLinkActive ariaCurrentWhenActive="page">Hardware</a>
      <a routerLink="/stock/kits" routerLinkActive ariaCurrentWhenActive="page">Kits</a>
      @if (isOwner()) {
        <a routerLink="/stock/earnings" routerLinkActive ariaCurrentWhenActive="page">Costs and earnings</a>
      }
    </nav>
    <router-outlet />
  `,
  styles: `
    :host {
      display: block;
      width: 100%;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class StockArea {
  private readonly session = inject(SessionApi);
  protected readonly isOwner = computed(() => this.session.role() === 'owner');
}
