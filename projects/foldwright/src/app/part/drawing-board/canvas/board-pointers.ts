import { type EditorEvent, type Modifiers, type PointerKind } from '../tools/tool';
import { type ScreenPoint, type Viewport, toLayout } from '../viewport';

/** A pointer as the browser tells it, px from the board's corner. */
export interface PointerInput {
  readonly pointerId: number;
  readonly pointer: PointerKind;
  readonly atPx: ScreenPoint;
  readonly modifiers: Modifiers;
  /** The middle button, or the space bar held down. */
  readonly isPanning: boolean;
}

/** What pointers come to: events for the tool in hand, or a change of the view. */
export type PointerAction =
  | { readonly kind: 'event'; readonly event: EditorEvent }
  | { readonly kind: 'pan'; readonly xPx: number; readonly yPx: number }
  | { readonly kind: 'zoom'; readonly factor: number; readonly at: ScreenPoint };

interface DownPointer {
  readonly atPx: ScreenPoint;
  readonly isPanning: boolean;
}

/**
 * Turns pointers into tool events and movements of the view: one pointer works, one with the space bar or the middle
 * button pans, two pan and pinch. A second finger drops what the first had begun.
 */
export class BoardPointers {
  private readonly down = new Map<number, DownPointer>();
  /** After a pinch no finger works until all are lifted. */
  private isPinching = false;

  press(input: PointerInput, viewport: Viewport): readonly PointerAction[] {
    const wasOne = this.down.size === 1;
    this.down.set(input.pointerId, { atPx: input.atPx, isPanning: input.isPanning });
    if (this.down.size > 1) {
      this.isPinching = true;
      return wasOne ? [{ kind: 'event', event: { kind: 'cancel' } }] : [];
    }
    return input.isPanning ? [] : [asEvent('press', input, viewport)];
  }

  move(input: PointerInput, viewport: Viewport): readonly PointerAction[] {
    const before = this.down.get(input.pointerId);
    if (before === undefined) {
      // A finger that is not down does not hover.
      return this.down.size === 0 && input.pointer !== 'touch' ? [asEvent('move', input, viewport)] : [];
    }
    if (this.isPinching) return this.pinch(input);
    this.down.set(input.pointerId, { ...before, atPx: input.atPx });
    if (!before.isPanning) return [asEvent('move', input, viewport)];
    return [{ kind: 'pan', xPx: input.atPx.xPx - before.atPx.xPx, yPx: input.atPx.yPx - before.atPx.yPx }];
  }

  release(input: PointerInput, viewport: Viewport): readonly PointerAction[] {
    const before = this.down.get(input.pointerId);
    this.down.delete(input.pointerId);
    const wasPinching = this.isPinching;
    if (this.down.size === 0) this.isPinching = false;
    if (before === undefined || before.isPanning || wasPinching) return [];
    return [asEvent('release', input, viewport)];
  }

  /** The browser took the pointer away. */
  lose(pointerId: number): readonly PointerAction[] {
    const before = this.down.get(pointerId);
    this.down.delete(pointerId);
    const wasPinching = this.isPinching;
    if (this.down.size === 0) this.isPinching = false;
    return before === undefined || before.isPanning || wasPinching
      ? []
      : [{ kind: 'event', event: { kind: 'cancel' } }];
  }

  private pinch(input: PointerInput): readonly PointerAction[] {
    const other = [...this.down.entries()].find(([id]) => id !== input.pointerId)?.[1];
    const before = this.down.get(input.pointerId);
    if (before === undefined) return [];
    this.down.set(input.pointerId, { ...before, atPx: input.atPx });
    if (other === undefined) return [];
    const spreadBefore = spread(before.atPx, other.atPx);
    const at = middle(input.atPx, other.atPx);
    const from = middle(before.atPx, other.atPx);
    const actions: PointerAction[] = [{ kind: 'pan', xPx: at.xPx - from.xPx, yPx: at.yPx - from.yPx }];
    if (spreadBefore > 8) actions.push({ kind: 'zoom', factor: spread(input.atPx, other.atPx) / spreadBefore, at });
    return actions;
  }
}

function asEvent(kind: 'press' | 'move' | 'release', input: PointerInput, viewport: Viewport): PointerAction {
  const { atPx, pointer, modifiers } = input;
  return { kind: 'event', event: { kind, at: toLayout(viewport, atPx), atPx, pointer, modifiers } };
}

function spread(a: ScreenPoint, b: ScreenPoint): number {
  return Math.hypot(a.xPx - b.xPx, a.yPx - b.yPx);
}

function middle(a: ScreenPoint, b: ScreenPoint): ScreenPoint {
  return { xPx: (a.xPx + b.xPx) / 2, yPx: (a.yPx + b.yPx) / 2 };
}
