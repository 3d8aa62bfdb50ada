import fc from 'fast-check';
import { developed } from '../bending/testing/developed';
import { runs } from '../bending/testing/runs';
import { lLayout, sampleStock } from '../bending/testing/sample-layouts';
import { loopClearance } from '../geometry/clearance';
import { flattenSegment } from '../geometry/flatten';
import { circleLoop, loopLength, polygonLoop, signedArea } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line } from '../geometry/segment';
import { mirrorLoop, moveLoop } from '../geometry/transform';
import { LETTER_COUNT, type NickMessage, SLOT_COUNT, messageOf, slotsOf } from './nick-code';
import { readNicks } from './read-nicks';
import { NickError, type NickSheet, nickRadiusMm, shortestNickEdgeMm, writeNicks } from './write-nicks';

jest.setTimeout(30_000 + runs() * 50);

const plate = (widthMm = 120, heightMm = 60): Loop =>
  polygonLoop([
    { x: 0, y: 0 },
    { x: widthMm, y: 0 },
    { x: widthMm, y: heightMm },
    { x: 0, y: heightMm },
  ]);
const sheet = (changes: Partial<NickSheet> = {}): NickSheet => ({
  outer: plate(),
  openings: [],
  keepClear: [],
  thicknessMm: 2,
  ...changes,
});

const letters = Array.from({ length: LETTER_COUNT }, (_, number) =>
  number < 26 ? String.fromCharCode(65 + number) : `A${String.fromCharCode(65 + number - 26)}`,
);
const message: fc.Arbitrary<NickMessage> = fc.record({
  letter: fc.constantFrom(...letters),
  hand: fc.constantFrom('either', 'left', 'right'),
});

describe('the code of nicks', () => {
  it('holds 47 letters in three hands, A to AU', () => {
    // C(14, 5) = 2002 patterns, of which 2002 / 14 = 143 add up to a multiple of 14; 143 / 3 hands = 47.
    expect([LETTER_COUNT, letters.at(-1)]).toEqual([47, 'AU']);
    expect(slotsOf({ letter: 'AV', hand: 'left' })).toBeNull();
    expect(slotsOf({ letter: 'a', hand: 'left' })).toBeNull();
  });

  it('gives back every message, and none for a nick lost, added or one slot off', () => {
    for (const letter of letters) {
      for (const hand of ['either', 'left', 'right'] as const) {
        const slots = slotsOf({ letter, hand }) ?? [];
        expect(messageOf(slots)).toEqual({ letter, hand });
        slots.forEach((slot, at) => {
          expect(messageOf(slots.toSpliced(at, 1))).toBeNull();
          for (const other of [slot - 1, slot + 1]) expect(messageOf(slots.with(at, other))).toBeNull();
        });
        for (let slot = 0; slot < SLOT_COUNT; slot += 1) {
          if (!slots.includes(slot)) expect(messageOf([...slots, slot])).toBeNull();
        }
      }
    }
  });
});

describe('nicks in an outline', () => {
  it('are half circles cut into the freest straight edge, the outline whole otherwise', () => {
    const { outer, at, radiusMm } = writeNicks(sheet(), { letter: 'B', hand: 'right' });
    expect(at).toHaveLength(8);
    expect(signedArea(outer)).toBeCloseTo(120 * 60 - (8 * Math.PI * radiusMm ** 2) / 2, 9);
    expect(loopLength(outer)).toBeCloseTo(2 * (120 + 60) + 8 * (Math.PI - 2) * radiusMm, 9);
  });

  it('are read back from the drawn outline, whichever way it lies', () => {
    fc.assert(
      fc.property(
        message,
        fc.integer({ min: 0, max: 359 }),
        fc.constantFrom(0.8, 1.5, 2, 3),
        (said, turnDeg, thicknessMm) => {
          const { outer } = writeNicks(sheet({ thicknessMm, outer: plate(180, 70) }), said);
          const turned = moveLoop({ turnDeg, shift: { x: 7, y: -3 } }, outer);
          const opened = [...turned.slice(turnDeg % turned.length), ...turned.slice(0, turnDeg % turned.length)];
          expect(readNicks(opened)).toEqual({ kind: 'read', message: said, isMirrored: false });
          expect(readNicks(mirrorLoop(opened))).toEqual({ kind: 'read', message: said, isMirrored: true });
        },
      ),
      { numRuns: runs() },
    );
  });

  it('are read back from a traced outline: chords for arcs, every corner a tenth of a millimetre off', () => {
    const off = fc.double({ min: -0.1, max: 0.1, noNaN: true });
    fc.assert(
      fc.property(
        message,
        fc.array(fc.tuple(off, off), { minLength: 60, maxLength: 60 }),
        fc.double({ min: 0, max: 360, noNaN: true }),
        fc.constantFrom(0.8, 1.5, 2, 3),
        (said, shakes, turnDeg, thicknessMm) => {
          const { outer } = writeNicks(sheet({ thicknessMm }), said);
          const turned = moveLoop({ turnDeg, shift: { x: -11, y: 5 } }, outer);
          const corners = turned.flatMap((segment): readonly Point[] => flattenSegment(segment, 0.15).slice(0, -1));
          const shaken = corners.map(({ x, y }, index) => {
            const [dx, dy] = shakes[index % shakes.length] ?? [0, 0];
            return { x: x + dx, y: y + dy };
          });
          const traced = polygonLoop(shaken);
          expect(readNicks(traced)).toEqual({ kind: 'read', message: said, isMirrored: false });
          // The other face up: the outline of the other hand, and never another message.
          expect(readNicks(mirrorLoop(traced))).toEqual({ kind: 'read', message: said, isMirrored: true });
        },
      ),
      { numRuns: runs() },
    );
  });

  it('are told as damaged when one is filled in, and as none on a bare outline', () => {
    const { outer, radiusMm } = writeNicks(sheet(), { letter: 'C', hand: 'either' });
    const arcs = outer.flatMap((segment, index) => (segment.kind === 'arc' ? [index] : []));
    for (const index of arcs) {
      const [before, after] = [outer[index - 1], outer[index + 1]];
      if (before === undefined || after === undefined) throw new Error('A nick without an edge.');
      const filled = [...outer.slice(0, index - 1), line(before.from, after.to), ...outer.slice(index + 2)];
      expect(readNicks(filled).kind).not.toBe('read');
    }
    expect(radiusMm).toBe(1);
    expect(readNicks(plate())).toEqual({ kind: 'none' });
    expect(readNicks(circleLoop({ x: 0, y: 0 }, 40))).toEqual({ kind: 'none' });
  });

  it('keep two thicknesses away from bends, openings and other edges', () => {
    const stock = sampleStock({ thicknessMm: 1.5 });
    const { flat, zones } = developed(lLayout(90, 90), stock);
    const openings = flat.holes.map(({ centre, diameterMm }) => circleLoop(centre, diameterMm / 2));
    const keepClear = zones.map((zone) => zone.outer);
    const { at } = writeNicks(
      { outer: flat.outer, openings, keepClear, thicknessMm: 1.5 },
      { letter: 'A', hand: 'left' },
    );
    for (const centre of at) {
      const nick = circleLoop(centre, nickRadiusMm(1.5));
      for (const loop of keepClear) expect(loopClearance(nick, loop)?.distanceMm ?? 0).toBeGreaterThanOrEqual(3);
    }
  });

  it('need an edge of a stated length, and say so', () => {
    const needMm = shortestNickEdgeMm(2);
    // 17 steps of 2 x 1 + 2 mm, a nick of 2 mm, and 4 mm free at either end.
    expect(needMm).toBe(17 * 4 + 2 + 8);
    expect(() => writeNicks(sheet({ outer: plate(needMm, 30) }), { letter: 'A', hand: 'either' })).not.toThrow();
    expect(() => writeNicks(sheet({ outer: plate(needMm - 0.05, 30) }), { letter: 'A', hand: 'either' })).toThrow(
      NickError,
    );
    expect(() => writeNicks(sheet(), { letter: 'ZZ', hand: 'either' })).toThrow(NickError);
  });
});
