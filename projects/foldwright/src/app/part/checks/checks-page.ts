import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import type { Assembly } from '@foldwright/shared/part/assembly';
import { entityNames } from '@foldwright/shared/part/entity-names';
import type { DeclaredUse } from '@foldwright/shared/part/part-document';
import type { Mend } from '@foldwright/shared/rules/finding';
import { FindingNote } from '@foldwright/ui/finding-note/finding-note';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { ComputedParts } from '../computed-parts';
import { BoardFrame } from '../drawing-board/board-frame';
import { DrawingBoard } from '../drawing-board/canvas/drawing-board';
import { chainDimensions, layoutChain } from '../drawing-board/drawing/dimensions';
import { drawingNotes } from '../drawing-board/drawing/notes';
import { drawingOfLayout } from '../drawing-board/drawing/sheet-drawing';
import { PartStore } from '../part-store';
import { mergeFindings, sheetWords, type MergedFinding } from './merged-findings';
import { AssemblyForm } from './assembly-form';
import { UseForm } from './use-form';

/** The checks step: every finding for both sheets with its place, reason and mend; and what the part is used for. */
@Component({
  selector: 'fw-checks-page',
  imports: [AssemblyForm, DrawingBoard, FindingNote, Pictogram, UseForm],
  templateUrl: './checks-page.html',
  styleUrl: './checks-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [BoardFrame],
})
export class ChecksPage {
  protected readonly store = inject(PartStore);
  protected readonly frame = inject(BoardFrame);
  private readonly parts = inject(ComputedParts);

  protected readonly insets = { top: 40, right: 40, bottom: 74, left: 74 };
  protected readonly merged = computed(() =>
    mergeFindings(this.parts.trial()?.findings ?? [], this.parts.production()?.findings ?? []),
  );
  private readonly findings = computed(() => this.merged().map(({ finding }) => finding));
  protected readonly marks = this.frame.marksOf(
    this.findings,
    computed(() => 'layout'),
  );
  protected readonly drawing = computed(() => {
    const layout = this.store.document()?.layout;
    return layout === undefined ? null : drawingOfLayout(layout, this.parts.production()?.development ?? null);
  });
  protected readonly dimensions = computed(() => {
    const layout = this.store.document()?.layout;
    return layout === undefined ? [] : chainDimensions(layoutChain(layout), this.frame.viewport());
  });
  protected readonly notes = computed(() => {
    const layout = this.store.document()?.layout;
    return layout === undefined ? [] : drawingNotes(layout, this.frame.viewport(), entityNames(layout));
  });
  protected readonly headline = computed(() => {
    const count = (severity: string): number =>
      this.findings().filter((finding) => finding.severity === severity).length;
    const [blockers, cautions] = [count('blocker'), count('caution')];
    if (blockers > 0) return `${blockers} to mend before it can be made`;
    if (cautions > 0) return `${cautions} to check`;
    return 'Nothing stands in the way of cutting and bending';
  });
  protected readonly label = computed(
    () => `Layout of ${this.store.detail()?.name ?? 'the part'} with the findings where they are`,
  );

  protected sheets(row: MergedFinding): string {
    return sheetWords(row, {
      trial: this.parts.trial()?.stockLabel ?? 'the trial sheet',
      production: this.parts.production()?.stockLabel ?? 'the production sheet',
    });
  }

  protected mend({ commands, label }: Mend): void {
    this.store.apply(commands, { label });
  }

  protected declare(uses: readonly DeclaredUse[]): void {
    this.store.apply([{ kind: 'setDeclaredUses', uses }]);
  }

  protected putOn(assembly: Assembly): void {
    this.store.apply([{ kind: 'setAssembly', assembly }]);
  }
}
