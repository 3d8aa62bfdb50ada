import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

/** A length drawn at the scale of the drawing beside it. */
@Component({
  selector: 'fw-scale-bar',
  template: `
    <svg [attr.width]="widthPx() + 12" height="12" role="img" [attr.aria-label]="name()">
      <path [attr.d]="bar()" />
    </svg>
    <span class="fw-figure" aria-hidden="true">{{ lengthMm() }} mm</span>
  `,
  styleUrl: './scale-bar.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ScaleBar {
  readonly pxPerMm = input.required<number>();
  readonly lengthMm = input(100);

  protected readonly widthPx = computed(() => this.lengthMm() * this.pxPerMm());
  protected readonly name = computed(() => `Scale bar, ${this.lengthMm()} mm`);
  protected readonly bar = computed(() => {
    const width = this.widthPx();
    return `M1 1.5v9M${1 + width} 1.5v9M1 6h${width}M${1 + width / 2} 4v4`;
  });
}
