import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { Severity } from '@foldwright/shared/rules/finding';

const WORDS: Readonly<Record<Severity, string>> = {
  blocker: 'Can’t be made',
  caution: 'Check this',
  hint: 'Good to know',
};

/** The words that stand beside a finding's sign everywhere. */
export function severityWords(severity: Severity): string {
  return WORDS[severity];
}

/** The sign of a finding: octagon, triangle or ring, told apart without colour. A word always stands beside it. */
@Component({
  selector: 'fw-finding-sign',
  template: `
    <svg viewBox="0 0 18 18" focusable="false" aria-hidden="true">
      @switch (severity()) {
        @case ('blocker') {
          <path fill="currentColor" d="M5.8 1.5h6.4l4.3 4.3v6.4l-4.3 4.3H5.8l-4.3-4.3V5.8z" />
          <path class="cut" d="M6 6l6 6M12 6l-6 6" />
        }
        @case ('caution') {
          <path class="triangle" fill="currentColor" d="M9 1.2 17.3 16H.7z" />
          <path class="cut" d="M9 6.8v4M9 13.6v.01" />
        }
        @case ('hint') {
          <circle class="ring" cx="9" cy="9" r="7.5" />
          <path class="stroke" d="M9 8.5v4M9 5.6v.01" />
        }
      }
    </svg>
  `,
  styleUrl: './finding-sign.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'severity()' },
})
export class FindingSign {
  readonly severity = input.required<Severity>();
}
