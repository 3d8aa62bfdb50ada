import { DOCUMENT, DestroyRef, Injectable, type Signal, inject, signal } from '@angular/core';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { readKeptCart } from '../api/kept-cart';

const MOST_OF_ONE = 500;
const keyOf = (shop: string): string => `foldwright.cart.${shop}`;

/** Lines of a cart, put together: one thing in one finish is one line. */
export function addLine(lines: readonly CartLine[], added: CartLine): readonly CartLine[] {
  const isSame = (line: CartLine): boolean => line.listingId === added.listingId && line.finishId === added.finishId;
  const known = lines.find(isSame);
  if (known === undefined) return [...lines, added];
  const quantity = Math.min(MOST_OF_ONE, known.quantity + added.quantity);
  return lines.map((line) => (isSame(line) ? { ...line, quantity } : line));
}

/** What is in the cart of each shop, kept in this browser: it outlives the page, and other tabs see it at once. */
@Injectable({ providedIn: 'root' })
export class CartStore {
  private readonly window = inject(DOCUMENT).defaultView;
  private readonly carts = new Map<string, ReturnType<typeof signal<readonly CartLine[]>>>();

  constructor() {
    const follow = (event: StorageEvent): void => {
      for (const [shop, lines] of this.carts) if (event.key === keyOf(shop)) lines.set(this.read(shop));
    };
    this.window?.addEventListener('storage', follow);
    inject(DestroyRef).onDestroy(() => this.window?.removeEventListener('storage', follow));
  }

  lines(shop: string): Signal<readonly CartLine[]> {
    return this.cart(shop).asReadonly();
  }

  add(shop: string, line: CartLine): void {
    this.keep(shop, addLine(this.cart(shop)(), line));
  }

  /** Nothing is left of a line with a quantity of 0. */
  change(shop: string, line: CartLine, quantity: number): void {
    const changed = this.cart(shop)().flatMap((one) => {
      if (one.listingId !== line.listingId || one.finishId !== line.finishId) return [one];
      return quantity > 0 ? [{ ...one, quantity: Math.min(MOST_OF_ONE, quantity) }] : [];
    });
    this.keep(shop, changed);
  }

  clear(shop: string): void {
    this.keep(shop, []);
  }

  private cart(shop: string): ReturnType<typeof signal<readonly CartLine[]>> {
    const known = this.carts.get(shop) ?? signal<readonly CartLine[]>(this.read(shop));
    this.carts.set(shop, known);
    return known;
  }

  private keep(shop: string, lines: readonly CartLine[]): void {
    this.cart(shop).set(lines);
    try {
      this.window?.localStorage.setItem(keyOf(shop), JSON.stringify(lines));
    } catch {
      // A browser that keeps nothing still has the cart as long as the page stays open.
    }
  }

  private read(shop: string): readonly CartLine[] {
    try {
      return readKeptCart(this.window?.localStorage.getItem(keyOf(shop)) ?? null);
    } catch {
      // What can't be read was not written by this version; the cart begins anew.
      return [];
    }
  }
}
