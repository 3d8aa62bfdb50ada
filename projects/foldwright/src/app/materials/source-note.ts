import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { TableSource } from '@foldwright/shared/stock/figure';
import { confidenceWords } from '@foldwright/ui/provenance/provenance-note';

/** The source of a tabled value and how far it can be trusted. What is only remembered or customary says so with a mark. */
@Component({
  selector: 'fw-source-note',
  template: `<span [class]="of().confidence">{{ trust() }}</span> {{ of().source }}`,
  styles: `
    :host {
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }

    span {
      display: inline-block;
      margin-right: 4px;
      padding: 0 6px;
      border-radius: 2px;
      background: var(--fw-paper-sunk);
      color: var(--fw-ink);
      white-space: nowrap;
    }

    .published {
      background: var(--fw-know-tint);
    }

    .memory {
      background: var(--fw-check-tint);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SourceNote {
  readonly of = input.required<TableSource>();

  protected readonly trust = computed(() => confidenceWords(this.of().confidence));
}
