import { Injectable, type Signal, computed, inject, signal } from '@angular/core';
import type { Finding } from '@foldwright/shared/rules/finding';
import { severityWords } from '@foldwright/ui/finding-note/finding-sign';
import type { RuleTool } from '@foldwright/ui/steel-rule/steel-rule';
import { PartStore } from '../part-store';
import { BoardEditor } from './board-editor';
import type { BoardMark } from './canvas/board-overlay';
import { extentAlongRule } from './drawing/selection-overlay';
import { layoutBounds } from './geometry/layout-edges';
import { type Viewport, toScreen } from './viewport';

/** What every page with a board keeps: the view, the chosen finding, the rule's zero and its tools at the end. */
@Injectable()
export class BoardFrame {
  private readonly store = inject(PartStore);
  private readonly editor = inject(BoardEditor);

  readonly viewport = signal<Viewport>({ pxPerMm: 2, origin: { xPx: 0, yPx: 0 } });
  private readonly chosenMark = signal<string | null>(null);

  readonly chosenFindingId = this.chosenMark.asReadonly();
  readonly selection = computed(() => {
    const layout = this.editor.drawn()?.layout;
    const ref = this.editor.selection();
    return layout === undefined || ref === null ? null : extentAlongRule(layout, ref);
  });
  /** The rule's zero lies at the left end of what is chosen, or of the sheet. */
  readonly zeroPx = computed(() => {
    const layout = this.editor.drawn()?.layout;
    const left = this.selection()?.fromMm ?? (layout === undefined ? 0 : (layoutBounds(layout)?.min.x ?? 0));
    return toScreen(this.viewport(), { x: left, y: 0 }).xPx;
  });
  readonly ruleSelection = computed(() => {
    const extent = this.selection();
    return extent === null ? null : { fromMm: 0, toMm: extent.toMm - extent.fromMm };
  });
  readonly tools = computed<readonly RuleTool[]>(() => {
    const undo = this.store.undoLabel();
    const redo = this.store.redoLabel();
    return [
      { id: 'undo', label: undo === null ? 'Undo' : `Undo: ${undo}`, icon: 'undo', disabled: undo === null },
      { id: 'redo', label: redo === null ? 'Redo' : `Redo: ${redo}`, icon: 'redo', disabled: redo === null },
      { id: 'fit', label: 'Zoom to fit', icon: 'fit' },
    ];
  });

  chooseFinding(id: string | null): void {
    this.chosenMark.update((current) => (current === id ? null : id));
  }

  /** Signs of findings where they are, in layout or in flat coordinates. */
  marksOf(findings: Signal<readonly Finding[]>, plane: Signal<'layout' | 'flat'>): Signal<readonly BoardMark[]> {
    return computed(() =>
      findings().flatMap((finding): BoardMark[] => {
        if (finding.at === null) return [];
        const at = toScreen(this.viewport(), finding.at[plane()]);
        return [
          {
            id: finding.id,
            severity: finding.severity,
            label: `${severityWords(finding.severity)}: ${finding.title}`,
            ...at,
            isChosen: finding.id === this.chosenMark(),
          },
        ];
      }),
    );
  }
}
