import type { Point } from '@foldwright/shared/geometry/point';
import { subtract, add } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { EntityRef } from '../geometry/entity';
import { HIT_TOLERANCE_PX, hitTest } from '../hit-testing/hit-test';
import { type SnapResult, snap } from '../snapping/snap';
import { snapCandidates } from '../snapping/layout-snaps';
import { handleOf, moveHandleTo, nudgeCommands } from './drag-commands';
import {
  DRAG_THRESHOLD_PX,
  type EditorEvent,
  IDLE,
  type Modifiers,
  type Tool,
  type ToolContext,
  type ToolOutcome,
  type ToolState,
  gridForZoom,
  onlyState,
} from './tool';

type PointerEventOf = Extract<EditorEvent, { atPx: unknown }>;

const SNAP_REACH_PX = 9;

/** Choosing and dragging: a press on a thing, then either a click that selects it or a drag that moves it. */
export const selectTool: Tool = (state, event, context) => {
  switch (event.kind) {
    case 'cancel':
      return { ...onlyState(IDLE), ...(state.phase === 'idle' ? { selection: null } : {}) };
    case 'key':
      return state.phase === 'idle' ? pressKey(event.key, event.modifiers, context) : onlyState(state);
    case 'press':
      return press(event, context);
    case 'move':
      return move(state, event, context);
    case 'release':
      return release(state, event, context);
  }
};

function press(event: PointerEventOf, context: ToolContext): ToolOutcome {
  return onlyState({ phase: 'pointing', target: targetAt(event, context), fromPx: event.atPx, from: event.at });
}

function move(state: ToolState, event: PointerEventOf, context: ToolContext): ToolOutcome {
  if (state.phase === 'dragging') return drag(state, event, context);
  if (state.phase !== 'pointing') return { ...onlyState(state), hover: targetAt(event, context) };
  const wanderedPx = Math.hypot(event.atPx.xPx - state.fromPx.xPx, event.atPx.yPx - state.fromPx.yPx);
  if (wanderedPx < DRAG_THRESHOLD_PX[event.pointer]) return onlyState(state);
  if (state.target === null || !context.canEdit) return onlyState(state);
  return drag({ phase: 'dragging', target: state.target, from: state.from }, event, context);
}

function drag(state: ToolState & { phase: 'dragging' }, event: PointerEventOf, context: ToolContext): ToolOutcome {
  const { commands, snapped } = dragTo(state.target, state.from, event, context);
  return { state, selection: state.target, hover: null, draft: commands, commit: null, snap: snapped, isDone: false };
}

function release(state: ToolState, event: PointerEventOf, context: ToolContext): ToolOutcome {
  if (state.phase === 'pointing') return { ...onlyState(IDLE), selection: state.target };
  if (state.phase !== 'dragging') return onlyState(IDLE);
  const { commands } = dragTo(state.target, state.from, event, context);
  return { ...onlyState(IDLE), commit: commands.length === 0 ? null : { commands, fold: null } };
}

/** A thing keeps the distance between its handle and the place it was taken by. */
function dragTo(
  target: EntityRef,
  from: Point,
  event: PointerEventOf,
  context: ToolContext,
): { readonly commands: readonly PartCommand[]; readonly snapped: SnapResult | null } {
  const { layout } = context.document;
  const handle = handleOf(layout, target);
  if (handle === null) return { commands: [], snapped: null };
  const wanted = add(handle, subtract(event.at, from));
  const snapped = snap(wanted, snapCandidates(layout, target), {
    toleranceMm: SNAP_REACH_PX / context.pxPerMm,
    gridMm: gridForZoom(context.pxPerMm),
    isSuspended: event.modifiers.ctrl,
    lockFrom: event.modifiers.shift ? handle : null,
  });
  return { commands: moveHandleTo(layout, target, snapped.point), snapped: snapped.kind === 'none' ? null : snapped };
}

function targetAt(event: PointerEventOf, context: ToolContext): EntityRef | null {
  const toleranceMm = HIT_TOLERANCE_PX[event.pointer] / context.pxPerMm;
  return hitTest(context.document.layout, event.at, toleranceMm, { kinds: context.selectable });
}

const ARROWS: Readonly<Record<string, Point>> = {
  ArrowLeft: { x: -1, y: 0 },
  ArrowRight: { x: 1, y: 0 },
  ArrowUp: { x: 0, y: 1 },
  ArrowDown: { x: 0, y: -1 },
};

/** How far one arrow key moves the selection, mm. */
export function nudgeStepMm(modifiers: Modifiers): number {
  if (modifiers.shift) return 10;
  return modifiers.alt ? 0.1 : 1;
}

function pressKey(key: string, modifiers: Modifiers, context: ToolContext): ToolOutcome {
  const { selection } = context;
  if (selection === null || !context.canEdit) return onlyState(IDLE);
  const arrow = ARROWS[key];
  if (arrow !== undefined) {
    const stepMm = nudgeStepMm(modifiers);
    const commands = nudgeCommands(context.document.layout, selection, { x: arrow.x * stepMm, y: arrow.y * stepMm });
    const fold = `nudge ${selection.kind} ${selection.id}`;
    return { ...onlyState(IDLE), commit: commands.length === 0 ? null : { commands, fold } };
  }
  if (key === 'Delete' || key === 'Backspace') {
    const command = removeCommand(selection);
    if (command !== null) return { ...onlyState(IDLE), selection: null, commit: { commands: [command], fold: null } };
  }
  return onlyState(IDLE);
}

/** What deleting a thing means; an edge by itself cannot go, only one of its corners. */
export function removeCommand(target: EntityRef): PartCommand | null {
  switch (target.kind) {
    case 'vertex':
      return { kind: 'removeVertex', edgeId: target.id };
    case 'hole':
    case 'slot':
      return { kind: 'removeFeature', featureId: target.id };
    case 'bend':
      return { kind: 'removeBend', bendId: target.id };
    case 'edge':
      return null;
  }
}
