import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { SaleItem } from '@foldwright/shared/contracts/sales';
import { finishWords, lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { fitInto } from '@foldwright/ui/formed-preview/fit-into';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { handWords } from './sale-words';

const ROOM_PX = { width: 96, height: 64 };

/** Pieces of a sale with the exact revision, hand and finish, and where each of them is. */
@Component({
  selector: 'fw-sale-items',
  imports: [FormedPreview, Pictogram, RouterLink],
  template: `
    <section class="fw-paper" aria-labelledby="items-heading">
      <h3 id="items-heading">What goes to the customer</h3>
      <ul>
        @for (row of rows(); track row.id) {
          <li>
            <div class="picture" aria-hidden="true">
              @if (row.picture; as picture) {
                <fw-formed-preview
                  [document]="picture.document"
                  [madeOf]="picture.madeOf"
                  [pxPerMm]="picture.pxPerMm"
                />
              } @else {
                <fw-pictogram name="bolt" />
              }
            </div>
            <div>
              <b>{{ row.name }}</b>
              <span class="fw-soft">{{ row.note }}</span>
              @if (row.hash; as hash) {
                <a class="fw-note" [routerLink]="['/parts', row.partId, 'release']">fingerprint {{ hash }}</a>
              }
            </div>
            <div>
              @if (row.letter; as letter) {
                <b class="fw-figure">{{ letter }}</b>
                <span class="fw-soft">{{ row.hand }}</span>
              }
            </div>
            <div class="counts">
              <b class="fw-figure">{{ row.quantity }}</b>
              @for (count of row.counts; track count.words) {
                <span [class.short]="count.isShort">{{ count.words }}</span>
              }
            </div>
          </li>
        }
      </ul>
    </section>
  `,
  styleUrl: './sale-items.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SaleItems {
  readonly items = input.required<readonly SaleItem[]>();

  protected readonly rows = computed(() =>
    this.items().map((item) => ({ ...describe(item), id: item.id, quantity: item.quantity, counts: countsOf(item) })),
  );
}

function countsOf(item: SaleItem): readonly { readonly words: string; readonly isShort: boolean }[] {
  const missing = item.short - item.beingCut;
  const counts: readonly (readonly [number, string, boolean])[] = [
    [item.shipped, 'sent', false],
    [item.reserved, 'on the shelf for it', false],
    [item.beingCut, 'being cut', false],
    [missing, 'missing', true],
    [item.cancelled, 'cancelled', false],
    [item.returned, 'came back', false],
  ];
  return counts.flatMap(([count, words, isShort]) => (count > 0 ? [{ words: `${count} ${words}`, isShort }] : []));
}

function describe({ what }: SaleItem) {
  if (what.kind === 'hardware') {
    return { name: what.name, note: what.specification, letter: null, hand: '', hash: null, partId: '', picture: null };
  }
  return {
    name: `${what.partNumber} ${what.partName}`,
    note: `${finishWords(what.finishId)}, ${what.materialLabel}`,
    letter: what.letter,
    hand: handWords(what.hand),
    hash: what.hash.slice(0, 12),
    partId: what.partId,
    picture: fitInto(what.document, lookOfFinish(what.finishId), ROOM_PX),
  };
}
