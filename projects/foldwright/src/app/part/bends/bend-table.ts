import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { BendRow } from '@foldwright/shared/bending/development';
import { formatDecimal } from '@foldwright/shared/units/length';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { ProvenanceNote } from '@foldwright/ui/provenance/provenance-note';
import type { PartInStock } from '../computed-parts';
import { referenceWords } from '../reference-words';

/** The bend table of one sheet: sizes, deduction with its reference, die and force, and under each where its K is from. */
@Component({
  selector: 'fw-bend-table',
  imports: [Pictogram, ProvenanceNote],
  templateUrl: './bend-table.html',
  styleUrl: './bend-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BendTable {
  readonly part = input.required<PartInStock>();
  readonly selectedId = input<string | null>(null);

  readonly selected = output<string>();

  protected readonly rows = computed<readonly BendRow[]>(() => this.part().figures?.bendTable ?? []);
  protected readonly sizes = computed(() => this.part().figures?.formedSizes ?? []);

  protected figure(value: number, decimals: number): string {
    return value.toFixed(decimals);
  }

  protected kFigure(value: number): string {
    return formatDecimal(value, 3);
  }

  protected readonly referenceOf = referenceWords;
}
