import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Finding, Mend } from '@foldwright/shared/rules/finding';
import { ProvenanceNote } from '../provenance/provenance-note';
import { FindingSign, severityWords } from './finding-sign';

/** One finding as a note on the bench: sign, word and title; what and where; what to do, with its one-click mend; why. */
@Component({
  selector: 'fw-finding-note',
  imports: [FindingSign, MatButtonModule, ProvenanceNote],
  templateUrl: './finding-note.html',
  styleUrl: './finding-note.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class]': 'finding().severity', '[class.compact]': 'compact()' },
})
export class FindingNote {
  readonly finding = input.required<Finding>();
  /** Whether the mend may be applied; a viewer only reads it. */
  readonly canMend = input(true);
  /** One line with the title only, as a card lists it. */
  readonly compact = input(false);

  readonly mended = output<Mend>();

  protected readonly word = computed(() => severityWords(this.finding().severity));
}
