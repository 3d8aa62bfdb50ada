import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { StockApi } from '../api/stock-api';

/** Kits: what is in them, what they cost, how many can be built now and what is short of one more. */
@Component({
  selector: 'fw-kits-page',
  imports: [EmptyBench, MatButtonModule, MoneyText, RouterLink],
  templateUrl: './kits-page.html',
  styleUrl: './kits-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KitsPage {
  protected readonly list = inject(StockApi).kits();
  protected readonly canMake = inject(SessionApi).canMake;
  protected readonly kits = computed(() =>
    (this.list.value()?.kits ?? []).map((kit) => ({
      ...kit,
      contents: kit.lines.map((line) =>
        line.kind === 'bracket'
          ? `${line.quantity} × ${line.bracket.partName}, revision ${line.bracket.letter}${line.finishId === null ? '' : `, ${finishWords(line.finishId).toLowerCase()}`}`
          : `${line.quantity} × ${line.hardware.name}`,
      ),
      finishes: kit.buildable.map(({ finishId, kits, shortest }) => ({
        finishId,
        words: finishWords(finishId),
        kits,
        short: shortest.map(({ what, missing }) => `${missing} × ${what}`).join(', '),
      })),
    })),
  );

  constructor() {
    rereadOn(['stock-changed'], () => this.list.reload());
  }
}
