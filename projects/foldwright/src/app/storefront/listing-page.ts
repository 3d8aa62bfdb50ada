import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { finishWords, lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { StorefrontApi } from '../api/storefront-api';
import { CartStore } from './cart-store';
import { MissingShop } from './missing-shop';
import { PieceTurntable } from './piece-turntable';
import { type LaidPiece, PiecesBoard } from './pieces-board';
import { QuantityField } from './quantity-field';
import { ShopFrame } from './shop-frame';
import { shelfWords } from './stock-words';

const HAND_WORDS = { either: '', left: ', left hand', right: ', right hand' } as const;

/** One listing: what is in it at one scale, what it fits, in which finish, what it costs and when it leaves. */
@Component({
  selector: 'fw-listing-page',
  imports: [
    FormedPreview,
    MatButtonModule,
    MissingShop,
    MoneyText,
    PartCardFrame,
    PieceTurntable,
    PiecesBoard,
    QuantityField,
    RouterLink,
    ShopFrame,
  ],
  templateUrl: './listing-page.html',
  styleUrl: './listing-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ListingPage {
  private readonly api = inject(StorefrontApi);
  private readonly cart = inject(CartStore);

  readonly shop = input.required<string>();
  readonly listing = input.required<string>();

  protected readonly front = this.api.front(this.shop);
  protected readonly read = this.api.listing(this.shop, this.listing);
  protected readonly item = this.read.value;
  protected readonly finishId = linkedSignal(() => this.item()?.finishes[0]?.finishId ?? 'bare');
  protected readonly quantity = signal(1);
  protected readonly added = signal(0);
  /** The piece that is on the turntable, by its place in the legend. */
  protected readonly turned = signal<number | null>(null);

  protected readonly finishes = computed(() => {
    const item = this.item();
    const drawn = item?.pieces.find((piece) => piece.kind === 'bracket');
    return (item?.finishes ?? []).map(({ finishId, surchargeMinor }) => ({
      finishId,
      words: finishWords(finishId),
      madeOf: lookOfFinish(finishId),
      document: drawn?.kind === 'bracket' ? drawn.document : null,
      surcharge: surchargeMinor === 0 ? null : { amountMinor: surchargeMinor, currency: item?.price.currency ?? 'EUR' },
    }));
  });
  protected readonly legend = computed(() =>
    (this.item()?.pieces ?? []).map((piece, at) => ({
      number: at + 1,
      words:
        piece.kind === 'bracket'
          ? `${piece.quantity > 1 ? `${piece.quantity} × ` : ''}${piece.name}, revision ${piece.letter}${HAND_WORDS[piece.hand]}`
          : `${piece.quantity} × ${piece.name}`,
      note:
        piece.kind === 'bracket'
          ? `${piece.materialLabel}${piece.finishId === null ? '' : `, ${finishWords(piece.finishId).toLowerCase()}`}; ${sizeWords(piece.sizeMm)}`
          : piece.specification,
      isBracket: piece.kind === 'bracket',
    })),
  );
  protected readonly laid = computed((): readonly LaidPiece[] =>
    (this.item()?.pieces ?? []).flatMap((piece, at) => {
      if (piece.kind !== 'bracket') return [];
      const finishId = piece.finishId ?? this.finishId();
      return [{ name: piece.name, document: piece.document, finishId, number: at + 1 }];
    }),
  );
  protected readonly onTurntable = computed(() => {
    const at = this.turned();
    const piece = at === null ? undefined : this.item()?.pieces[at - 1];
    return piece?.kind === 'bracket' ? piece : null;
  });
  protected readonly price = computed(() => {
    const item = this.item();
    if (item === undefined) return null;
    const surcharge = item.finishes.find(({ finishId }) => finishId === this.finishId())?.surchargeMinor ?? 0;
    return { amountMinor: (item.price.amountMinor + surcharge) * this.quantity(), currency: item.price.currency };
  });
  protected readonly availability = computed(() => {
    const found = this.item()?.availability.find(({ finishId }) => finishId === this.finishId());
    if (found === undefined) return null;
    const words = shelfWords(found.onShelf, `in ${finishWords(this.finishId()).toLowerCase()}`, found.leavesInDays);
    return { words, isThere: found.onShelf >= this.quantity() };
  });

  protected choose(finishId: string): void {
    this.finishId.set(finishId);
    this.added.set(0);
  }

  protected turn(at: number): void {
    this.turned.update((turned) => (turned === at ? null : at));
  }

  protected addToCart(): void {
    const item = this.item();
    if (item === undefined) return;
    this.cart.add(this.shop(), { listingId: item.id, finishId: this.finishId(), quantity: this.quantity() });
    this.added.set(this.quantity());
  }

  protected photoUrl(photoId: string): string {
    return this.api.photoUrl(this.shop(), photoId);
  }
}

/** Outside size of a formed bracket, for a tape: whole millimetres. */
function sizeWords({ x, y, z }: { readonly x: number; readonly y: number; readonly z: number }): string {
  return `${Math.round(x)} × ${Math.round(y)} × ${Math.round(z)} mm`;
}
