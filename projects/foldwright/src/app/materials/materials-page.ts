import { ChangeDetectionStrategy, Component, DOCUMENT, inject } from '@angular/core';
import { SHEET_MATERIALS } from '@foldwright/shared/stock/materials';
import { SourceNote } from './source-note';
import { figuresOf, kFromWords, soldIn } from './material-figures';
import { type TradeTable, TRADE_TABLES } from './trade-tables';

/** The materials and tables the product reckons with, to read: every value with its source and how far to trust it. */
@Component({
  selector: 'fw-materials-page',
  imports: [SourceNote],
  templateUrl: './materials-page.html',
  styleUrl: './materials-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class MaterialsPage {
  private readonly document = inject(DOCUMENT);

  protected readonly materials = SHEET_MATERIALS.map((material) => ({
    material,
    figures: figuresOf(material),
    kFrom: kFromWords(material),
    soldIn: soldIn(material),
  }));
  protected readonly tables = TRADE_TABLES;

  /** Sources of whole columns, each named once under its table. */
  protected columnSources(table: TradeTable) {
    const bySource = new Map<
      string,
      { readonly columns: string[]; readonly of: NonNullable<TradeTable['columns'][number]['source']> }
    >();
    for (const { label, source } of table.columns) {
      if (source === undefined) continue;
      const known = bySource.get(source.source) ?? { columns: [], of: source };
      known.columns.push(label);
      bySource.set(source.source, known);
    }
    return [...bySource.values()].map(({ columns, of }) => ({ columns: columns.join(', '), of }));
  }

  protected goTo(event: Event, id: string): void {
    event.preventDefault();
    const section = this.document.getElementById(id);
    section?.scrollIntoView({ block: 'start' });
    section?.focus({ preventScroll: true });
  }
}
