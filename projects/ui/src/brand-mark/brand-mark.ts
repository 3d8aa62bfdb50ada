import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** An F cut from one strip: the upper arm is folded up along a scribed line, the lower one is drilled. */
@Component({
  selector: 'fw-brand-mark',
  template: `
    <svg viewBox="0 0 32 32" focusable="false" aria-hidden="true">
      <path
        class="stem"
        d="M5 6.7A1.7 1.7 0 0 1 6.7 5H13v10.5h8.3A1.7 1.7 0 0 1 23 17.2v4.6a1.7 1.7 0 0 1-1.7 1.7H13v5.3a1.7 1.7 0 0 1-1.7 1.7H6.7A1.7 1.7 0 0 1 5 28.8z"
      />
      <path class="fold" d="M14.4 4.6 27.7.7A1 1 0 0 1 29 1.7v6.1a1.2 1.2 0 0 1-.9 1.2L14.4 13z" />
      <circle class="hole" cx="18.2" cy="19.5" r="1.7" />
    </svg>
    @if (withName()) {
      <span class="name">Foldwright</span>
    }
  `,
  styleUrl: './brand-mark.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BrandMark {
  readonly withName = input(true);
}
