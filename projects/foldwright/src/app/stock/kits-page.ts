import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { KitLine } from '@foldwright/shared/contracts/kits';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { finishWords, lookOfFinish } from '@foldwright/ui/formed-preview/finish-look';
import { fitInto } from '@foldwright/ui/formed-preview/fit-into';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { rereadOn } from '../api/reread';
import { SessionApi } from '../api/session-api';
import { StockApi } from '../api/stock-api';

const PICTURE_ROOM_PX = { width: 64, height: 44 };

/** Kits: what is in them, what they cost and leave, how many can be built now and what is short of one more. */
@Component({
  selector: 'fw-kits-page',
  imports: [EmptyBench, FormedPreview, MatButtonModule, MoneyText, Pictogram, RouterLink],
  templateUrl: './kits-page.html',
  styleUrl: './kits-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KitsPage {
  protected readonly list = inject(StockApi).kits();
  protected readonly canMake = inject(SessionApi).canMake;
  private readonly documents = computed(
    () => new Map((this.list.value()?.drawings ?? []).map(({ revisionId, document }) => [revisionId, document])),
  );
  protected readonly kits = computed(() =>
    (this.list.value()?.kits ?? []).map((kit) => ({
      ...kit,
      contents: kit.lines.map((line) => ({ words: lineWords(line), picture: this.pictureOf(line) })),
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

  private pictureOf(line: KitLine) {
    if (line.kind !== 'bracket') return null;
    const document = this.documents().get(line.bracket.revisionId);
    return document === undefined ? null : fitInto(document, lookOfFinish(line.finishId ?? 'bare'), PICTURE_ROOM_PX);
  }
}

function lineWords(line: KitLine): string {
  if (line.kind === 'hardware') return `${line.quantity} × ${line.hardware.name}`;
  const finish = line.finishId === null ? '' : `, ${finishWords(line.finishId).toLowerCase()}`;
  return `${line.quantity} × ${line.bracket.partName}, revision ${line.bracket.letter}${finish}`;
}
