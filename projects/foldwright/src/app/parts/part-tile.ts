import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { PartSummary } from '@foldwright/shared/contracts/parts';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { factsOf, partLink } from './part-facts';

/** One part in the list: drawn in what it is made of today, then said in a fixed order of lines. */
@Component({
  selector: 'fw-part-tile',
  imports: [FindingSign, FormedPreview, Pictogram, RouterLink],
  templateUrl: './part-tile.html',
  styleUrl: './part-tile.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PartTile {
  readonly part = input.required<PartSummary>();
  /** The list's scale; null while it isn't known yet, then the bench stays empty. */
  readonly pxPerMm = input.required<number | null>();
  readonly now = input.required<Date>();

  protected readonly facts = computed(() => factsOf(this.part(), this.now()));
  protected readonly link = computed(() => partLink(this.part()));
}
