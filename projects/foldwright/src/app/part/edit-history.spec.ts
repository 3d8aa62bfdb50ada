import { starterDocument } from '@foldwright/shared/part/starter-document';
import { applyCommand } from '@foldwright/shared/part/apply-command';
import { EMPTY_HISTORY, afterRedo, afterUndo, nextRedo, nextUndo, recordStep, undoOf } from './edit-history';

const start = starterDocument({ shape: 'flat-plate', widthMm: 100, heightMm: 60 });
const wide = applyCommand(start, { kind: 'slideEdge', edgeId: 'e2', byMm: 1 });
const wider = applyCommand(wide, { kind: 'slideEdge', edgeId: 'e2', byMm: 1 });

describe('edit history', () => {
  it('joins steps of one fold and no others', () => {
    const step = (id: string, fold: string | null) => ({ id, label: id, fold });
    const one = recordStep(EMPTY_HISTORY, { ...step('a', 'nudge'), before: start, after: wide });
    expect(recordStep(one, { ...step('b', 'nudge'), before: wide, after: wider }).past).toHaveLength(1);
    expect(recordStep(one, { ...step('b', 'other'), before: wide, after: wider }).past).toHaveLength(2);
    expect(recordStep(one, { ...step('b', null), before: wide, after: wider }).past).toHaveLength(2);
  });

  it('moves steps between past and future, and a new edit ends the future', () => {
    const first = recordStep(EMPTY_HISTORY, { id: 'a', label: 'a', fold: null, before: start, after: wide });
    const step = nextUndo(first);
    if (step === null) throw new Error('a step to undo');
    expect(undoOf(step)).toMatchObject({ kind: 'revert', reason: 'undo', of: 'a' });
    const undone = afterUndo(first, step);
    expect(nextUndo(undone)).toBeNull();
    expect(nextRedo(undone)?.id).toBe('a');
    expect(afterRedo(undone, step).past).toHaveLength(1);
    expect(recordStep(undone, { id: 'b', label: 'b', fold: null, before: start, after: wide }).future).toEqual([]);
  });
});
