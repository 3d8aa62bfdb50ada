import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { BendRow } from '@foldwright/shared/bending/development';
import { formatDecimal } from '@foldwright/shared/units/length';
import { confidenceWords } from '@foldwright/ui/provenance/provenance-note';

/** Where the bends' K comes from, in half a line; several sources each get theirs. */
@Component({
  selector: 'fw-k-source',
  template: `
    @for (line of lines(); track line) {
      <p>{{ line }}</p>
    }
  `,
  styles: ':host { display: block; font: var(--fw-note); color: var(--fw-ink-soft); }',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KSource {
  readonly rows = input.required<readonly BendRow[]>();

  protected readonly lines = computed(() => {
    const bySource = new Map<string, BendRow[]>();
    for (const row of this.rows()) {
      const key = `${row.kFactor.toFixed(3)} ${row.kProvenance.text}`;
      bySource.set(key, [...(bySource.get(key) ?? []), row]);
    }
    return [...bySource.values()].flatMap((rows) => {
      const first = rows[0];
      if (first === undefined) return [];
      const names = bySource.size > 1 ? `${rows.map((row) => row.name).join(', ')}: ` : '';
      const { text, confidence } = first.kProvenance;
      // Where the words say already that a person entered it, saying so twice helps nobody.
      const trust = confidence === 'entered' ? '' : ` (${confidenceWords(confidence)})`;
      const line = `${names}K ${formatDecimal(first.kFactor, 3)}, ${text}${trust}`;
      return first.kNote === null ? [line] : [line, first.kNote];
    });
  });
}
