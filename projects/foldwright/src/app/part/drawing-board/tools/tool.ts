import type { BendDeclaration, HolePurpose } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { EntityKind, EntityRef } from '../geometry/entity';
import type { SnapResult } from '../snapping/snap';
import type { ScreenPoint } from '../viewport';

export type PointerKind = 'mouse' | 'pen' | 'touch';

export interface Modifiers {
  readonly ctrl: boolean;
  readonly shift: boolean;
  readonly alt: boolean;
}

export const NO_MODIFIERS: Modifiers = { ctrl: false, shift: false, alt: false };

/** What a hand did, told in millimetres; tools never see an event of the browser. */
export type EditorEvent =
  | {
      readonly kind: 'press' | 'move' | 'release';
      readonly at: Point;
      readonly atPx: ScreenPoint;
      readonly pointer: PointerKind;
      readonly modifiers: Modifiers;
    }
  /** Escape, a lost capture, a second finger: whatever was going on is dropped. */
  | { readonly kind: 'cancel' }
  | { readonly kind: 'key'; readonly key: string; readonly modifiers: Modifiers };

export type ToolName = 'select' | 'hole' | 'slot' | 'bend-line' | 'split';

/** A bend without its id and place. */
export type BendDefaults = Omit<BendDeclaration, 'id' | 'line'>;

/** What new things are made with until a person says otherwise. */
export interface ToolSettings {
  readonly hole: HolePurpose;
  readonly slot: { readonly lengthMm: number; readonly widthMm: number };
  readonly bend: BendDefaults;
}

/** What a tool may look at. */
export interface ToolContext {
  readonly document: PartDocument;
  readonly selection: EntityRef | null;
  readonly pxPerMm: number;
  readonly settings: ToolSettings;
  /** Kinds that this step lets a person choose. */
  readonly selectable: readonly EntityKind[];
  readonly canEdit: boolean;
  readonly newId: () => string;
}

/** What is going on in the select tool: nothing, a press that may still be a click, or a drag. */
export type ToolState =
  | { readonly phase: 'idle' }
  | {
      readonly phase: 'pointing';
      readonly target: EntityRef | null;
      readonly fromPx: ScreenPoint;
      readonly from: Point;
    }
  | { readonly phase: 'dragging'; readonly target: EntityRef; readonly from: Point }
  /** The first point of a slot or a bend line is down. */
  | { readonly phase: 'placing'; readonly first: Point; readonly fromPx: ScreenPoint };

export const IDLE: ToolState = { phase: 'idle' };

/** Commands to be kept. Batches with the same `fold` that follow each other are one step of undo. */
export interface Commit {
  readonly commands: readonly PartCommand[];
  readonly fold: string | null;
}

/** What a tool answers to one event. Only `commit` changes the document; `draft` is drawn and forgotten. */
export interface ToolOutcome {
  readonly state: ToolState;
  /** Left out = unchanged. */
  readonly selection?: EntityRef | null;
  readonly hover?: EntityRef | null;
  readonly draft: readonly PartCommand[];
  readonly commit: Commit | null;
  readonly snap: SnapResult | null;
  /** Whether the hand goes back to the select tool. */
  readonly isDone: boolean;
}

/** A tool is a pure step from state and event to state and outcome. */
export type Tool = (state: ToolState, event: EditorEvent, context: ToolContext) => ToolOutcome;

/** An outcome that changes nothing but the state. */
export function onlyState(state: ToolState): ToolOutcome {
  return { state, draft: [], commit: null, snap: null, isDone: false };
}

/** Pixels a press may wander and still be a click; a finger is less steady. */
export const DRAG_THRESHOLD_PX = { mouse: 4, pen: 6, touch: 10 } as const;

/** Spacing of the grid that points are drawn to at a zoom, mm: never finer than a hand can hold. */
export function gridForZoom(pxPerMm: number): number {
  if (pxPerMm >= 20) return 0.1;
  if (pxPerMm >= 8) return 0.5;
  if (pxPerMm >= 2) return 1;
  return 5;
}
