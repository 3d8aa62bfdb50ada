import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { type MadeOf, drawPart } from './draw-part';

/**
 * A part as it stands on the bench, in the colour of what it is made of, at a given scale: lists draw everything at one
 * scale, so that size and state are seen before they are read.
 */
@Component({
  selector: 'fw-formed-preview',
  templateUrl: './formed-preview.html',
  styleUrl: './formed-preview.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'madeOf()' },
})
export class FormedPreview {
  readonly document = input.required<PartDocument>();
  readonly madeOf = input.required<MadeOf>();
  readonly pxPerMm = input.required<number>();
  /** Name for readers; null where the words beside it say what it is. */
  readonly label = input<string | null>(null);

  protected readonly drawing = computed(() => drawPart(this.document(), this.madeOf()));
  protected readonly viewBox = computed(() => {
    const { minX, minY, widthPx, heightPx } = this.drawing();
    return `${minX} ${minY} ${Math.max(1, widthPx)} ${Math.max(1, heightPx)}`;
  });
  protected readonly widthPx = computed(() => Math.max(1, this.drawing().widthPx) * this.pxPerMm());
  protected readonly heightPx = computed(() => Math.max(1, this.drawing().heightPx) * this.pxPerMm());
}
