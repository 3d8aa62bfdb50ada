import { Injectable, computed, inject, linkedSignal, signal } from '@angular/core';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { isSameJson } from '@foldwright/shared/part/canonical-json';
import type { PartDocument, Template } from '@foldwright/shared/part/part-document';
import { PartStore } from '../part-store';
import type { EntityKind, EntityRef } from './geometry/entity';
import { withBendsKept } from './geometry/keep-bends';
import { EMPTY_EDITOR, type EditorState, forgetMissing, selectEntity, stepEditor, takeTool } from './tools/editor';
import { proposedBend } from './tools/proposed-bend';
import type { EditorEvent, ToolName, ToolSettings } from './tools/tool';

const FIRST_SETTINGS: ToolSettings = {
  hole: { kind: 'clearance', thread: 'M5', fit: 'medium' },
  slot: { lengthMm: 20, widthMm: 6.6 },
  bend: proposedBend(null),
};

/** The hand at the drawing board: tool, selection and the gesture under way, beside the document and never in it. */
@Injectable()
export class BoardEditor {
  private readonly store = inject(PartStore);

  /** What is no longer in the document is let go of, whoever took it away. */
  private readonly state = linkedSignal<PartDocument | null, EditorState>({
    source: this.store.document,
    computation: (document, previous) =>
      document === null || previous === undefined ? EMPTY_EDITOR : forgetMissing(previous.value, document),
  });
  private readonly kinds = signal<readonly EntityKind[]>([]);
  private readonly template = computed(() => this.store.document()?.template ?? null, { equal: isSameJson });
  /** Another template brings the bend it calls for; the rest stays as it was last used. */
  private readonly settingsState = linkedSignal<Template | null, ToolSettings>({
    source: this.template,
    computation: (template, previous) => ({ ...(previous?.value ?? FIRST_SETTINGS), bend: proposedBend(template) }),
  });

  readonly editor = this.state.asReadonly();
  readonly selection = computed(() => this.state().selection);
  readonly settings = this.settingsState.asReadonly();
  /** The document with the gesture's draft on top: what is seen while a hand moves. */
  readonly drawn = computed<PartDocument | null>(() => {
    const document = this.store.document();
    const { draft } = this.state();
    if (document === null || draft.length === 0) return document;
    try {
      return applyCommands(document, withBendsKept(document, draft));
    } catch (error) {
      // The hand is somewhere the drawing can't follow; it waits where it was.
      if (error instanceof CommandRefusal) return document;
      throw error;
    }
  });

  /** Whether a hand holds something that is not put down yet. */
  readonly isInGesture = computed(() => this.state().draft.length > 0);

  /** Names what this step lets a person choose, and lets go of anything else. */
  enterStep(selectable: readonly EntityKind[]): void {
    this.kinds.set(selectable);
    const { selection } = this.state();
    this.state.update((editor) =>
      selectEntity(editor, selection !== null && selectable.includes(selection.kind) ? selection : null),
    );
  }

  /** Hands an event to the tool; what it commits goes to the draft. */
  act(event: EditorEvent, pxPerMm: number): void {
    const document = this.store.document();
    if (document === null) return;
    const { editor, commit } = stepEditor(this.state(), event, {
      document,
      pxPerMm,
      settings: this.settingsState(),
      selectable: this.kinds(),
      canEdit: this.store.canEdit(),
      newId: newEntityId,
    });
    if (commit === null) {
      this.state.set(editor);
      return;
    }
    // What is about to be added can only be chosen once it is there.
    this.state.set({ ...editor, selection: null });
    const isTaken = this.store.apply(commit.commands, { fold: commit.fold });
    this.state.update((current) => ({ ...current, selection: isTaken ? editor.selection : null }));
  }

  select(ref: EntityRef | null): void {
    this.state.update((editor) => selectEntity(editor, ref));
  }

  take(tool: ToolName): void {
    this.state.update((editor) => takeTool(editor, tool));
  }

  /** What new holes, slots and bends are made with. */
  changeSettings(change: Partial<ToolSettings>): void {
    this.settingsState.update((settings) => ({ ...settings, ...change }));
  }
}

/** An id for a new edge, hole, slot or bend: made here, inside the command, so that every replay is the same. */
export function newEntityId(): string {
  return crypto.randomUUID();
}
