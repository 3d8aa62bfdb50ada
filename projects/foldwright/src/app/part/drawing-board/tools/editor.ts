import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { EntityRef } from '../geometry/entity';
import { handleOf } from './drag-commands';
import type { SnapResult } from '../snapping/snap';
import { bendLineTool, holeTool, slotTool, splitTool } from './place-tools';
import { selectTool } from './select-tool';
import {
  type Commit,
  type EditorEvent,
  IDLE,
  type Tool,
  type ToolContext,
  type ToolName,
  type ToolState,
} from './tool';

/** Everything an editor knows beside the document. */
export interface EditorState {
  readonly tool: ToolName;
  readonly toolState: ToolState;
  readonly selection: EntityRef | null;
  readonly hover: EntityRef | null;
  /** Commands drawn on top of the document while a gesture lasts. */
  readonly draft: readonly PartCommand[];
  readonly snap: SnapResult | null;
}

export const EMPTY_EDITOR: EditorState = {
  tool: 'select',
  toolState: IDLE,
  selection: null,
  hover: null,
  draft: [],
  snap: null,
};

const TOOLS: Readonly<Record<ToolName, Tool>> = {
  select: selectTool,
  hole: holeTool,
  slot: slotTool,
  'bend-line': bendLineTool,
  split: splitTool,
};

export interface EditorStep {
  readonly editor: EditorState;
  readonly commit: Commit | null;
}

/** Hands one event to the tool in hand. Only a commit, in the answer, is meant to change the document. */
export function stepEditor(
  editor: EditorState,
  event: EditorEvent,
  context: Omit<ToolContext, 'selection'>,
): EditorStep {
  const outcome = TOOLS[editor.tool](editor.toolState, event, { ...context, selection: editor.selection });
  return {
    editor: {
      tool: outcome.isDone ? 'select' : editor.tool,
      toolState: outcome.state,
      selection: outcome.selection === undefined ? editor.selection : outcome.selection,
      hover: outcome.hover === undefined ? editor.hover : outcome.hover,
      draft: outcome.draft,
      snap: outcome.snap,
    },
    commit: outcome.commit,
  };
}

/** Takes another tool in hand; what was half done is dropped. */
export function takeTool(editor: EditorState, tool: ToolName): EditorState {
  return { ...editor, tool, toolState: IDLE, hover: null, draft: [], snap: null };
}

/** Chooses a thing from a list instead of with the pointer. */
export function selectEntity(editor: EditorState, selection: EntityRef | null): EditorState {
  return { ...editor, tool: 'select', toolState: IDLE, selection, draft: [], snap: null };
}

/** Lets go of what is no longer in the document, for instance after an undo or another person's change. */
export function forgetMissing(editor: EditorState, document: PartDocument): EditorState {
  const isThere = (ref: EntityRef | null): boolean => ref === null || handleOf(document.layout, ref) !== null;
  if (isThere(editor.selection) && isThere(editor.hover)) return editor;
  return {
    ...editor,
    selection: isThere(editor.selection) ? editor.selection : null,
    hover: isThere(editor.hover) ? editor.hover : null,
  };
}
