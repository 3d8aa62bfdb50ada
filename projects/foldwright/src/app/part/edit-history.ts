import type { PartCommand } from '@foldwright/shared/part/commands';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { isSameJson } from '@foldwright/shared/part/canonical-json';
import { redoCommand, undoCommand } from '@foldwright/shared/part/slices';

/** One own step that can be taken back. `isStuck`: somebody else changed the same thing since, so it stands. */
export interface HistoryStep {
  readonly id: string;
  readonly label: string;
  readonly before: PartDocument;
  readonly after: PartDocument;
  readonly fold: string | null;
  readonly isStuck: boolean;
}

/** Own steps, oldest first; `future` are the undone ones, the next to be done again first. */
export interface EditHistory {
  readonly past: readonly HistoryStep[];
  readonly future: readonly HistoryStep[];
}

export const EMPTY_HISTORY: EditHistory = { past: [], future: [] };

/** Steps kept; older ones stay in the draft but can no longer be undone here. */
const MOST_STEPS = 300;

/** Keeps a step. One with the same `fold` as the last joins it: ten presses of an arrow key are one step. */
export function recordStep(history: EditHistory, step: Omit<HistoryStep, 'isStuck'>): EditHistory {
  const last = history.past.at(-1);
  if (last !== undefined && step.fold !== null && last.fold === step.fold && isSameJson(last.after, step.before)) {
    const joined = { ...last, after: step.after, label: step.label };
    return { past: [...history.past.slice(0, -1), joined], future: [] };
  }
  return { past: [...history.past, { ...step, isStuck: false }].slice(-MOST_STEPS), future: [] };
}

/** The step that undo would take back: the last that is not stuck. */
export function nextUndo(history: EditHistory): HistoryStep | null {
  return history.past.findLast((step) => !step.isStuck) ?? null;
}

/** The step that redo would do again. */
export function nextRedo(history: EditHistory): HistoryStep | null {
  return history.future.find((step) => !step.isStuck) ?? null;
}

/** The command that takes a step back, or null when the step changed nothing. */
export function undoOf(step: HistoryStep): PartCommand | null {
  return undoCommand(step.before, step.after, step.label);
}

/** The command that does a step again. */
export function redoOf(step: HistoryStep): PartCommand | null {
  return redoCommand(step.before, step.after, step.label);
}

/** The step was taken back. */
export function afterUndo(history: EditHistory, step: HistoryStep): EditHistory {
  return { past: history.past.filter(({ id }) => id !== step.id), future: [step, ...history.future] };
}

/** The step was done again. */
export function afterRedo(history: EditHistory, step: HistoryStep): EditHistory {
  // A fold must not reach into a step that was done again: the next nudge is a step of its own.
  return {
    past: [...history.past, { ...step, fold: null }],
    future: history.future.filter(({ id }) => id !== step.id),
  };
}

/** Somebody else's change stands in the way of the step; it is kept in view and passed over from now on. */
export function markStuck(history: EditHistory, stepId: string): EditHistory {
  const mark = (step: HistoryStep): HistoryStep => (step.id === stepId ? { ...step, isStuck: true } : step);
  return { past: history.past.map(mark), future: history.future.map(mark) };
}

/** The undo of a step came to nothing, because somebody else changed the same thing first: the step stands, stuck. */
export function undoFailed(history: EditHistory, step: HistoryStep): EditHistory {
  return {
    past: [...history.past, { ...step, isStuck: true }],
    future: history.future.filter(({ id }) => id !== step.id),
  };
}

/** Likewise for doing it again: the step stays undone. */
export function redoFailed(history: EditHistory, step: HistoryStep): EditHistory {
  return {
    past: history.past.filter(({ id }) => id !== step.id),
    future: [{ ...step, isStuck: true }, ...history.future],
  };
}

/** An own edit never reached the draft: its step goes, because there is nothing to take back. */
export function dropStep(history: EditHistory, stepId: string): EditHistory {
  return {
    past: history.past.filter(({ id }) => id !== stepId),
    future: history.future.filter(({ id }) => id !== stepId),
  };
}
