import type { BendDeclaration } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { distance, subtract } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { creaseAcross } from '../geometry/crease';
import type { EntityRef } from '../geometry/entity';
import { HIT_TOLERANCE_PX, hitTest } from '../hit-testing/hit-test';
import { type SnapResult, snap } from '../snapping/snap';
import { snapCandidates } from '../snapping/layout-snaps';
import {
  DRAG_THRESHOLD_PX,
  type EditorEvent,
  IDLE,
  type Tool,
  type ToolContext,
  type ToolOutcome,
  gridForZoom,
  onlyState,
} from './tool';

type PointerEventOf = Extract<EditorEvent, { atPx: unknown }>;

const SNAP_REACH_PX = 10;
/** A second point closer than this says no direction yet, mm. */
const LEAST_LINE_MM = 0.5;

/** One press, one hole of the purpose that is set. It stays selected, so its size can be typed at once. */
export const holeTool: Tool = (state, event, context) => {
  if (event.kind === 'cancel') return { ...onlyState(IDLE), isDone: true };
  if (event.kind === 'key') return onlyState(state);
  const snapped = snapPointer(event, context, null);
  const place = (id: string): PartCommand => ({
    kind: 'addFeature',
    feature: { kind: 'hole', id, centre: snapped.point, purpose: context.settings.hole },
  });
  if (event.kind !== 'release') return { ...onlyState(IDLE), snap: snapped, draft: [place(DRAFT_ID)] };
  const id = context.newId();
  return finish([place(id)], { kind: 'hole', id });
};

/** Two points are the centres of the ends; a single click lays a slot of the set length level. */
export const slotTool: Tool = (state, event, context) => {
  if (event.kind === 'cancel') return { ...onlyState(IDLE), isDone: true };
  if (event.kind === 'key') return onlyState(state);
  const first = state.phase === 'placing' ? state.first : null;
  const snapped = snapPointer(event, context, first);
  const place = (id: string, from: Point, to: Point): PartCommand => ({
    kind: 'addFeature',
    feature: { kind: 'slot', id, from, to, widthMm: context.settings.slot.widthMm },
  });
  const level = levelSlot(first ?? snapped.point, context);
  if (event.kind === 'press' && state.phase === 'idle') {
    return {
      ...onlyState({ phase: 'placing', first: snapped.point, fromPx: event.atPx }),
      snap: snapped,
      draft: [place(DRAFT_ID, level.from, level.to)],
    };
  }
  if (state.phase !== 'placing')
    return { ...onlyState(IDLE), snap: snapped, draft: [place(DRAFT_ID, level.from, level.to)] };
  const isDragged = hasWandered(state.fromPx, event);
  const [from, to] = isDragged ? [state.first, snapped.point] : [level.from, level.to];
  if (event.kind === 'release' && distance(from, to) >= LEAST_LINE_MM) {
    const id = context.newId();
    return finish([place(id, from, to)], { kind: 'slot', id });
  }
  return { ...onlyState(state), snap: snapped, draft: [place(DRAFT_ID, from, to)] };
};

/** Two clicks or one drag across the sheet; the crease is taken on to the edges on both sides. */
export const bendLineTool: Tool = (state, event, context) => {
  if (event.kind === 'cancel') return { ...onlyState(IDLE), isDone: state.phase === 'idle' };
  if (event.kind === 'key') return onlyState(state);
  const first = state.phase === 'placing' ? state.first : null;
  const snapped = snapPointer(event, context, first);
  if (first === null || state.phase !== 'placing') {
    if (event.kind !== 'press') return { ...onlyState(IDLE), snap: snapped };
    return { ...onlyState({ phase: 'placing', first: snapped.point, fromPx: event.atPx }), snap: snapped };
  }
  const crease = creaseThrough(first, snapped.point, context);
  const bend = (id: string): BendDeclaration | null =>
    crease === null ? null : { ...context.settings.bend, id, line: crease };
  const isSecondPoint = hasWandered(state.fromPx, event) && (event.kind === 'release' || event.kind === 'press');
  if (isSecondPoint) {
    const id = context.newId();
    const declared = bend(id);
    if (declared !== null) return finish([{ kind: 'addBend', bend: declared }], { kind: 'bend', id });
  }
  const shown = bend(DRAFT_ID);
  return { ...onlyState(state), snap: snapped, draft: shown === null ? [] : [{ kind: 'addBend', bend: shown }] };
};

/** A press on an edge puts a corner there. */
export const splitTool: Tool = (state, event, context) => {
  if (event.kind === 'cancel') return { ...onlyState(IDLE), isDone: true };
  if (event.kind === 'key') return onlyState(state);
  const toleranceMm = HIT_TOLERANCE_PX[event.pointer] / context.pxPerMm;
  const target = hitTest(context.document.layout, event.at, toleranceMm, { kinds: ['edge'] });
  if (target === null || event.kind !== 'release') return { ...onlyState(IDLE), hover: target };
  const snapped = snapPointer(event, context, null);
  const id = context.newId();
  const newEdge = { id, start: snapped.point, bulge: 0 };
  return finish([{ kind: 'insertVertex', edgeId: target.id, newEdge }], { kind: 'vertex', id });
};

/** Id of what is drawn before it is placed; it never leaves the browser. */
const DRAFT_ID = 'to-be-placed';

function finish(commands: readonly PartCommand[], selection: EntityRef): ToolOutcome {
  return { state: IDLE, selection, hover: null, draft: [], commit: { commands, fold: null }, snap: null, isDone: true };
}

function snapPointer(event: PointerEventOf, context: ToolContext, lockFrom: Point | null): SnapResult {
  return snap(event.at, snapCandidates(context.document.layout, null), {
    toleranceMm: SNAP_REACH_PX / context.pxPerMm,
    gridMm: gridForZoom(context.pxPerMm),
    isSuspended: event.modifiers.ctrl,
    lockFrom: event.modifiers.shift ? lockFrom : null,
  });
}

function hasWandered(fromPx: { readonly xPx: number; readonly yPx: number }, event: PointerEventOf): boolean {
  return Math.hypot(event.atPx.xPx - fromPx.xPx, event.atPx.yPx - fromPx.yPx) >= DRAG_THRESHOLD_PX[event.pointer];
}

function levelSlot(centre: Point, context: ToolContext): { readonly from: Point; readonly to: Point } {
  const half = Math.max(0.5, (context.settings.slot.lengthMm - context.settings.slot.widthMm) / 2);
  return { from: { x: centre.x - half, y: centre.y }, to: { x: centre.x + half, y: centre.y } };
}

function creaseThrough(a: Point, b: Point, context: ToolContext): { readonly from: Point; readonly to: Point } | null {
  if (distance(a, b) < LEAST_LINE_MM) return null;
  const middle = { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
  return creaseAcross(context.document.layout, middle, subtract(b, a));
}
