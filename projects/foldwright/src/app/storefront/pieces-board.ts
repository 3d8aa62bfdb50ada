import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  ElementRef,
  afterNextRender,
  computed,
  inject,
  input,
  signal,
} from '@angular/core';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { drawPart } from '@foldwright/ui/formed-preview/draw-part';
import { lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { KraftGround } from '@foldwright/ui/kraft-ground/kraft-ground';

/** A bracket to lay on the bench. */
export interface LaidPiece {
  readonly name: string;
  readonly document: PartDocument;
  readonly finishId: string;
  /** Number on the bench and in the legend; null where there is no legend. */
  readonly number: number | null;
}

/** Room for the widest piece, px: all are drawn at the scale at which it fits. */
const MOST_ROOM_PX = 340;
const MARGINS_PX = 96;

/** Parts of what is sold, laid out on the bench at one scale and numbered. */
@Component({
  selector: 'fw-pieces-board',
  imports: [FormedPreview, KraftGround],
  template: `
    <fw-kraft-ground>
      <ul>
        @for (piece of laid(); track $index) {
          <li>
            @if (piece.number !== null) {
              <span class="number" aria-hidden="true">{{ piece.number }}</span>
            }
            <fw-formed-preview
              [document]="piece.document"
              [madeOf]="piece.madeOf"
              [pxPerMm]="pxPerMm()"
              [label]="piece.name"
            />
          </li>
        }
      </ul>
    </fw-kraft-ground>
  `,
  styleUrl: './pieces-board.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PiecesBoard {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  private readonly destroyed = inject(DestroyRef);

  readonly pieces = input.required<readonly LaidPiece[]>();

  private readonly widthPx = signal(MOST_ROOM_PX);

  protected readonly laid = computed(() =>
    this.pieces().map((piece) => ({ ...piece, madeOf: lookOfFinish(piece.finishId) })),
  );
  protected readonly pxPerMm = computed(() => {
    const sizes = this.laid().map(({ document, madeOf }) => {
      const { widthPx, heightPx } = drawPart(document, madeOf);
      return Math.max(widthPx, heightPx * 1.3);
    });
    const roomPx = Math.min(MOST_ROOM_PX, this.widthPx() - MARGINS_PX);
    return Math.min(2.4, roomPx / Math.max(1, ...sizes));
  });

  constructor() {
    afterNextRender(() => {
      if (typeof ResizeObserver === 'undefined') return;
      const observer = new ResizeObserver(([entry]) => this.widthPx.set(entry?.contentRect.width ?? MOST_ROOM_PX));
      observer.observe(this.host);
      this.destroyed.onDestroy(() => observer.disconnect());
    });
  }
}
