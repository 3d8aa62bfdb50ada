import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink, RouterLinkActive } from '@angular/router';
import type { ShopFront } from '@foldwright/shared/contracts/storefront';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { Notices } from '../api/notices';
import { SessionApi } from '../api/session-api';
import { NoticeCard } from '@foldwright/ui/notice-card/notice-card';
import { CartStore } from './cart-store';

/** Masthead and foot of a workshop's shop around its pages. */
@Component({
  selector: 'fw-shop-frame',
  imports: [BrandMark, NoticeCard, Pictogram, RouterLink, RouterLinkActive],
  templateUrl: './shop-frame.html',
  styleUrl: './shop-frame.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShopFrame {
  private readonly cart = inject(CartStore);
  protected readonly notices = inject(Notices);
  protected readonly isSignedIn = inject(SessionApi).isSignedIn;

  readonly front = input.required<ShopFront>();

  protected readonly initials = computed(() =>
    this.front()
      .name.split(/\s+/)
      .slice(0, 2)
      .map((word) => word.charAt(0))
      .join(''),
  );
  protected readonly inCart = computed(() =>
    this.cart
      .lines(this.front().slug)()
      .reduce((sum, { quantity }) => sum + quantity, 0),
  );
}
