import * as fc from 'fast-check';
import { partCommandSchema } from '@foldwright/shared/contracts/part-document-schema';
import { applyCommand, applyCommands } from '@foldwright/shared/part/apply-command';
import { canonicalJson, isSameJson } from '@foldwright/shared/part/canonical-json';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { describeCommand } from '@foldwright/shared/part/describe-command';
import { checkInvariants } from '@foldwright/shared/part/invariants';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { diffDocuments, redoCommand, undoCommand } from '@foldwright/shared/part/slices';
import { anyCommand, furnishedBracket, tryApply } from '../support/any-command';

describe('any sequence of commands', () => {
  it('keeps the invariants and the old document', () => {
    const before = canonicalJson(furnishedBracket);
    fc.assert(
      fc.property(fc.array(anyCommand, { maxLength: 12 }), (commands) => {
        expect(checkInvariants(commands.reduce(tryApply, furnishedBracket))).toEqual([]);
        expect(canonicalJson(furnishedBracket)).toBe(before);
      }),
      { numRuns: 200 },
    );
  });

  it('replays to the letter, also after a journey as JSON', () => {
    fc.assert(
      fc.property(fc.array(anyCommand, { maxLength: 12 }), (commands) => {
        const sent = commands.map((one): PartCommand => partCommandSchema.parse(JSON.parse(JSON.stringify(one))));
        expect(canonicalJson(sent.reduce(tryApply, furnishedBracket))).toBe(
          canonicalJson(commands.reduce(tryApply, furnishedBracket)),
        );
      }),
      { numRuns: 100 },
    );
  });

  it('is undone and done again exactly, order of lists included', () => {
    fc.assert(
      fc.property(fc.array(anyCommand, { minLength: 1, maxLength: 8 }), (commands) => {
        const after = commands.reduce(tryApply, furnishedBracket);
        const undo = undoCommand(furnishedBracket, after, 'several edits');
        if (undo === null) {
          expect(isSameJson(furnishedBracket, after)).toBe(true);
          return;
        }
        const undone = applyCommand(after, partCommandSchema.parse(JSON.parse(JSON.stringify(undo))));
        expect(undone).toEqual(furnishedBracket);
        const redo = redoCommand(furnishedBracket, after, 'several edits');
        expect(redo === null ? null : applyCommand(undone, redo)).toEqual(after);
      }),
      { numRuns: 200 },
    );
  });

  it('can be named for the history', () => {
    fc.assert(
      fc.property(anyCommand, (one) => {
        expect(describeCommand(one)).toMatch(/^[A-Z].{3,60}$/u);
      }),
    );
  });
});

describe('undo beside somebody else’s edits', () => {
  const removed = applyCommand(furnishedBracket, { kind: 'removeFeature', featureId: 'h1' });
  const undo = undoCommand(furnishedBracket, removed, 'Take hole away');

  it('leaves alone what another person changed elsewhere', () => {
    const theirs = applyCommand(removed, { kind: 'moveFeature', featureId: 'h2', by: { x: 3, y: 0 } });
    const undone = undo === null ? theirs : applyCommand(theirs, undo);
    expect(undone.layout.features.map(({ id }) => id)).toEqual(['h1', 's1', 'h2']);
    expect(undone.layout.features[2]).toMatchObject({ centre: { x: 48, y: 40 } });
  });

  it('refuses to overwrite what another person changed in the same place', () => {
    const moved = applyCommand(furnishedBracket, { kind: 'moveFeature', featureId: 'h1', by: { x: 1, y: 0 } });
    const movedOn = applyCommand(moved, { kind: 'moveFeature', featureId: 'h1', by: { x: 0, y: 1 } });
    const undoMove = undoCommand(furnishedBracket, moved, 'Move hole');
    if (undoMove === null) throw new Error('a move is a change');
    expect(() => applyCommand(movedOn, undoMove)).toThrow(
      expect.objectContaining({ code: 'changedSince', ids: ['h1'] }) as Error,
    );
  });

  it('names every kind of slice that differs', () => {
    const other: PartDocument = applyCommands(furnishedBracket, [
      { kind: 'setStock', role: 'trial', stock: { ...furnishedBracket.stocks.trial, thicknessMm: 2 } },
      { kind: 'removeBend', bendId: 'b1' },
      { kind: 'removeCutout', loopId: 'c1' },
      { kind: 'setDeclaredUses', uses: ['heat'] },
    ]);
    expect(diffDocuments(furnishedBracket, other).map(({ before }) => before.slice)).toEqual([
      'stock',
      'cutout',
      'bend',
      'declaredUses',
    ]);
    expect(diffDocuments(furnishedBracket, furnishedBracket)).toEqual([]);
  });
});

describe('canonicalJson', () => {
  it('spells equal values alike whatever the order of their members', () => {
    expect(canonicalJson({ b: 1, a: [1.5, null, 'x"'], c: undefined })).toBe('{"a":[1.5,null,"x\\""],"b":1}');
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        expect(JSON.parse(canonicalJson(value))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
    );
  });

  it('refuses what JSON cannot say', () => {
    expect(() => canonicalJson({ a: Number.NaN })).toThrow(RangeError);
    expect(() => canonicalJson(() => 1)).toThrow(RangeError);
  });

  it('tells different values apart', () => {
    expect(isSameJson([1, 2], [2, 1])).toBe(false);
    expect(isSameJson({ a: 1 }, { a: 1, b: undefined })).toBe(true);
    expect(isSameJson({ a: null }, {})).toBe(false);
    expect(isSameJson([], {})).toBe(false);
    expect(isSameJson(0, -0)).toBe(true);
  });
});
