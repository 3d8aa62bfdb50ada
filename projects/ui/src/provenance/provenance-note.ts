import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Confidence, Provenance } from '@foldwright/shared/bending/development';

const CONFIDENCE_WORDS: Readonly<Record<Confidence, string>> = {
  published: 'published',
  'common-practice': 'common practice',
  memory: 'from memory, check it',
  measured: 'measured',
  entered: 'entered by hand',
};

/** How far a tabled or computed value can be trusted, in words. */
export function confidenceWords(confidence: Confidence): string {
  return CONFIDENCE_WORDS[confidence];
}

/** Where a number comes from, in half a line of plain words. The source's own name follows where it says more. */
@Component({
  selector: 'fw-provenance',
  template: `{{ line() }}
    @if (trust(); as words) {
      <span class="trust">({{ words }})</span>
    }`,
  styles: `
    :host {
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }

    .trust {
      white-space: nowrap;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProvenanceNote {
  readonly of = input.required<Provenance>();

  protected readonly line = computed(() => {
    const { text, source } = this.of();
    return source === '' || text.includes(source) ? text : `${text}, ${source}`;
  });
  /** Said once: a source that says it itself needs no second word. */
  protected readonly trust = computed(() => {
    const words = confidenceWords(this.of().confidence);
    return this.line().includes(words) ? null : words;
  });
}
