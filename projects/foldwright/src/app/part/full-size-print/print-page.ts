import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { type PrintPaper, planPrintTiles } from '@foldwright/shared/drawing/print-tiles';
import type { StockRole } from '@foldwright/shared/part/part-document';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { DraftsApi } from '../../api/drafts-api';
import { ComputedParts } from '../computed-parts';
import { PartStore } from '../part-store';
import { PrintPlanView } from './print-plan-view';

/** The full-size print: which paper, which sheet of metal, how it is tiled, and how to see that the printer kept the scale. */
@Component({
  selector: 'fw-print-page',
  imports: [MatButtonModule, Pictogram, PrintPlanView],
  templateUrl: './print-page.html',
  styleUrl: './print-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PrintPage {
  private readonly draftsApi = inject(DraftsApi);
  protected readonly store = inject(PartStore);
  protected readonly parts = inject(ComputedParts);

  protected readonly papers = ['A4', 'Letter'] as const satisfies readonly PrintPaper[];
  protected readonly roles = ['trial', 'production'] as const satisfies readonly StockRole[];
  protected readonly paper = signal<PrintPaper>('A4');
  protected readonly role = signal<StockRole>('trial');
  protected readonly part = computed(() => this.parts.of(this.role())());
  protected readonly flat = computed(() => this.part()?.figures?.flat ?? null);
  protected readonly plan = computed(() => {
    const flat = this.flat();
    return flat === null ? null : planPrintTiles(flat.bounds, this.paper());
  });
  protected readonly url = computed(() => {
    const draftId = this.store.draftId();
    return draftId === null ? null : this.draftsApi.printUrl(draftId, this.paper(), this.role());
  });
  protected readonly count = computed(() => {
    const sheets = this.plan()?.tiles.length ?? 0;
    return sheets === 1 ? 'one sheet' : `${sheets} sheets`;
  });

  protected label(role: StockRole): string {
    return this.parts.of(role)()?.stockLabel ?? role;
  }
}
