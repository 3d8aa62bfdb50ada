import * as fc from 'fast-check';
import { circleLoop, pointInLoop, reverseLoop, slotLoop } from './loop';
import { moveLoop, movePoint } from './transform';

describe('pointInLoop on the chords of arcs', () => {
  it('finds every point of a circle of two halves, those on its chord too', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 359 }),
        fc.double({ min: -1.5, max: 1.5, noNaN: true }),
        (turnDeg, reach) => {
          fc.pre(Math.abs(Math.abs(reach) - 1) > 1e-6);
          const motion = { turnDeg, shift: { x: 3, y: -2 } };
          const circle = moveLoop(motion, circleLoop({ x: 0, y: 0 }, 10));
          const onChord = movePoint(motion, { x: 10 * reach, y: 0 });
          const expected = Math.abs(reach) < 1 ? 'inside' : 'outside';
          expect(pointInLoop(onChord, circle, 0)).toBe(expected);
          expect(pointInLoop(onChord, reverseLoop(circle), 0)).toBe(expected);
        },
      ),
    );
  });

  it.each([0, 90, 180, 270, 30])('finds the middle of a slot turned by %d°, and the chords of its ends', (turnDeg) => {
    const motion = { turnDeg, shift: { x: 0, y: 0 } };
    const slot = moveLoop(motion, slotLoop({ x: 0, y: 0 }, { x: 20, y: 0 }, 6));
    for (const x of [-2.9, 0, 10, 20, 22.9]) {
      for (const y of [-0.5, 0, 0.5]) expect(pointInLoop(movePoint(motion, { x, y }), slot, 0)).toBe('inside');
    }
    for (const x of [-3.1, 23.1]) expect(pointInLoop(movePoint(motion, { x, y: 0 }), slot, 0)).toBe('outside');
  });
});
