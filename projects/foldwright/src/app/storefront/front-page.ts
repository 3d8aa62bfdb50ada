import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import { drawPart } from '@foldwright/ui/formed-preview/draw-part';
import { lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { debounceTime } from 'rxjs';
import { StorefrontApi } from '../api/storefront-api';
import { MissingShop } from './missing-shop';
import { ShopFrame } from './shop-frame';

const SEARCH_AFTER_MS = 250;
/** Widest thing on a card, px: everything in the shop is drawn at the scale at which it fits. */
const ROOM_PX = 170;

/** The front of a shop: what it sells, all at one scale, and a search over it. */
@Component({
  selector: 'fw-front-page',
  imports: [FormedPreview, MissingShop, MoneyText, Pictogram, ReactiveFormsModule, RouterLink, ShopFrame],
  templateUrl: './front-page.html',
  styleUrl: './front-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FrontPage {
  private readonly api = inject(StorefrontApi);
  private readonly router = inject(Router);

  readonly shop = input.required<string>();
  readonly kind = input<string>();
  readonly words = input<string>();

  protected readonly front = this.api.front(this.shop);
  protected readonly found = this.api.search(
    this.shop,
    () => this.words() ?? '',
    () => {
      const kind = this.kind();
      return kind === 'kit' || kind === 'bracket' ? kind : undefined;
    },
  );
  protected readonly search = new FormControl('', { nonNullable: true });
  protected readonly cards = computed(() =>
    (this.found.value()?.cards ?? []).map((card) => ({
      ...card,
      pieces: card.pieces.map((piece) => ({ document: piece.document, madeOf: lookOfFinish(piece.finishId) })),
    })),
  );
  protected readonly pxPerMm = computed(() => {
    const widths = this.cards().flatMap(({ pieces }) =>
      pieces.map(({ document, madeOf }) => drawPart(document, madeOf).widthPx),
    );
    return Math.min(1.6, ROOM_PX / Math.max(1, ...widths));
  });
  protected readonly heading = computed(() => {
    const heading = { kit: 'Kits', bracket: 'Brackets' }[this.kind() ?? ''];
    return heading ?? this.front.value()?.headline ?? '';
  });

  constructor() {
    this.search.valueChanges.pipe(debounceTime(SEARCH_AFTER_MS), takeUntilDestroyed()).subscribe((words) => {
      void this.router.navigate([], {
        queryParams: { words: words.trim() === '' ? null : words.trim() },
        queryParamsHandling: 'merge',
        replaceUrl: true,
      });
    });
  }

  protected showAll(): void {
    this.search.setValue('');
    void this.router.navigate([], { queryParams: {} });
  }
}
