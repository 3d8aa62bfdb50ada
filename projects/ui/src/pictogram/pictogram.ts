import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PICTOGRAMS, type PictogramName } from './pictogram-paths';

/** One of the product's signs, in the colour of the text around it. Named for readers only where no word stands beside it. */
@Component({
  selector: 'fw-pictogram',
  template: `
    <svg viewBox="0 0 24 24" focusable="false" aria-hidden="true">
      @for (path of paths(); track $index) {
        <path [attr.class]="path.stroke" [attr.d]="path.d" />
      }
    </svg>
  `,
  styleUrl: './pictogram.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {
    '[attr.role]': 'label() === null ? null : "img"',
    '[attr.aria-label]': 'label()',
    '[attr.aria-hidden]': 'label() === null ? "true" : null',
    '[class.large]': 'size() === "large"',
    '[class.small]': 'size() === "small"',
    '[attr.data-pictogram]': 'name()',
  },
})
export class Pictogram {
  readonly name = input.required<PictogramName>();
  readonly label = input<string | null>(null);
  /** 16, 18 or 24 px; the drawing is made for 24. */
  readonly size = input<'small' | 'medium' | 'large'>('medium');

  protected readonly paths = computed(() => PICTOGRAMS[this.name()]);
}
