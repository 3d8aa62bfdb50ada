import { describe, expect, it } from '@jest/globals';
import type { Layout } from '../bending/layout';
import { developed } from '../bending/testing/developed';
import {
  hatLayout,
  lLayout,
  sampleStock,
  stripLayout,
  trayLayout,
  uLayout,
  zLayout,
} from '../bending/testing/sample-layouts';
import { findBendOrder } from './find-bend-order';
import type { BendOrder } from './find-bend-order';
import { PUNCHES } from './tooling';

/** T 2, R 2, V 16: apex setback 4 at 90 degrees, die 24 wide, its groove's edges 8 from the middle. */
const orderOf = (layout: Layout): BendOrder => findBendOrder(developed(layout, sampleStock()));
const withStraightOnly = (layout: Layout): BendOrder =>
  findBendOrder(developed(layout, sampleStock()), { punches: PUNCHES.filter(({ id }) => id === 'straight') });

const square = { reference: 'outsideApex' } as const;
/** Lip, leg, web, leg, lip, all folded the same way: a channel that closes over itself. Outside sizes. */
const lippedChannel = (lip: number, leg: number, web: number): Layout =>
  stripLayout([lip, leg, web, leg, lip], [square, square, square, square], 40, 2);

const obstaclesOf = (order: BendOrder): readonly string[] =>
  order.ok
    ? []
    : order.blockedBy.map(({ hindrance }) => (hindrance.kind === 'hits' ? hindrance.obstacle : hindrance.kind));

// At the end of a square bend both sides stand at 45 degrees. A flange of height h that already stands on a web w leans over the
// punch then: seen from the apex of the bend under way its tip is at x = (h - w) / sqrt 2, y = (h + w) / sqrt 2
// outside, and T / sqrt 2 = 1.4 farther on inside. The straight punch
// takes up x from -6 to 6 up to y = 95, its clamp -13 to 13 up to 120, the ram -40 to 40 above; the gooseneck leaves x < 14 free
// between y = 34 and 70.
describe('an order of bends', () => {
  it('L 50 + 30: one stroke of the straight punch', () => {
    expect(orderOf(lLayout(50, 30))).toMatchObject({
      ok: true,
      order: [{ bendId: 'bend-1', punchId: 'straight', dieId: 'v16-88', isTurnedOver: false, isPressedFlat: false }],
    });
  });

  it('U of 45 on a web of 30: the straight punch cannot make it', () => {
    // Tip at x = 15 / 1.414 = 10.6, y = 53: past the middle, so the flange runs through the punch's body.
    expect(obstaclesOf(withStraightOnly(uLayout(45, 30)))).toEqual(['punch', 'punch']);
  });

  it('the same U: the gooseneck can, for the second bend', () => {
    // 10.6 + 1.4 = 12 < 14 at y = 53, within the sweep of the neck.
    const order = orderOf(uLayout(45, 30));
    expect(order.ok && order.order.map(({ punchId }) => punchId)).toEqual(['straight', 'gooseneck']);
  });

  it('U of 90 on a web of 30: its flange meets every punch', () => {
    // Tip at x = 60 / 1.414 = 42, y = 85: through the gooseneck too, whichever way it is turned.
    expect(obstaclesOf(orderOf(uLayout(90, 30)))).toEqual(['punch', 'punch']);
  });

  it('U of 140 on a web of 150: its flange meets the ram', () => {
    // Tip at x = -7, y = 205: clear of the punch at y < 120, but x > -40 from y = 172 on, where the ram is.
    expect(obstaclesOf(orderOf(uLayout(140, 150)))).toEqual(['ram', 'ram']);
  });

  it('box with four flanges of 20: yes, with punches as long as each side', () => {
    // Side flanges stand beyond the ends of the punch; opposite ones lean to x = (20 - 60) / 1.414 = -28 at most; 20 < 120 to the ram.
    const order = orderOf(trayLayout(100, 60, 20));
    expect(order.ok && order.order.map(({ punchId }) => punchId)).toEqual(Array(4).fill('straight'));
  });

  it('channel with lips of 15 on legs of 60 over a web of 50: no', () => {
    // A bend at the web last: the other leg's corner is at x = (60 - 50) / 1.414 = 7, y = 78, and its lip goes on from there to
    // x = 7 + 15 / 1.414 = 18, y = 67: through the gooseneck's neck, which starts at 14. A lip last: its leg of 60 rises in front, the
    // web of 50 goes on to x = -7, y = 78, and the other leg from there down to x = 35, y = 35: across any punch.
    const order = orderOf(lippedChannel(15, 60, 50));
    expect(order).toMatchObject({ ok: false, reason: 'blocked' });
    expect(new Set(obstaclesOf(order))).toEqual(new Set(['punch']));
  });

  it('the same channel with legs of 30 over a web of 90: yes, lips first', () => {
    // Corner of leg and lip at x = (30 - 90) / 1.414 = -42, y = 85; the lip ends 15 / 1.414 = 11 farther back, at x = -32: clear of 6.
    const order = orderOf(lippedChannel(15, 30, 90));
    expect(order.ok && order.order.map(({ bendId }) => bendId)).toEqual(['bend-4', 'bend-1', 'bend-3', 'bend-2']);
  });

  it('Z 25, 40, 25: yes, turned over in between', () => {
    const order = orderOf(zLayout(25, 40, 25));
    expect(order.ok && order.order.map(({ isTurnedOver }) => isTurnedOver)).toEqual([true, false]);
  });

  it('Z with a web of 11: the web does not span half the mouth once the other bend is made', () => {
    // Flat web between tangent lines 11 - 2 x 4 = 3, half a bend's allowance 4.163 / 2 = 2.081: 5.081 of 8.
    const order = orderOf(zLayout(25, 11, 25));
    expect(obstaclesOf(order)).toEqual(['slips', 'slips']);
    expect(order).toMatchObject({ ok: false, blockedBy: [{ hindrance: { reachMm: expect.closeTo(5.081, 3) } }, {}] });
  });

  it('Z with a web of 16: it spans the mouth, but the flange that hangs down meets the die', () => {
    // Web 16 - 4 - 4 = 8 flat and 2.081: flat as far as 10.081 of 8. From there the first bend turns down with R 2; the die's edge
    // lies at 12, where its inside face is 1.4 down already.
    expect(obstaclesOf(orderOf(zLayout(25, 16, 25)))).toEqual(['die', 'die']);
  });

  it('hat of brims 20, sides 25, crown 50: yes', () => {
    const order = orderOf(hatLayout());
    expect(order.ok && order.order.map(({ isTurnedOver }) => isTurnedOver)).toEqual([true, true, false, false]);
  });

  it('a flange bent by 135 needs the acute punch and its die', () => {
    // 45 degrees included: less than the 88 of the straight tip, more than the 30 of the acute one.
    const acute = lLayout(60, 40, { bendAngleDeg: 135, reference: 'outsideTangent' });
    expect(orderOf(acute)).toMatchObject({ ok: true, order: [{ punchId: 'acute', dieId: 'v16-30' }] });
    expect(obstaclesOf(withStraightOnly(acute))).toEqual(['punch']);
  });

  it('a hem: bent by 150 with the acute punch, then pressed flat', () => {
    const hem = lLayout(60, 25, { bendAngleDeg: 180, reference: 'tangent', insideRadiusMm: 0.5 });
    expect(orderOf(hem)).toMatchObject({ ok: true, order: [{ punchId: 'acute', isPressedFlat: true }] });
  });

  it('a flange of 6 is shorter than half the mouth', () => {
    // 6 - 4 = 2 flat and 2.081 of the bend: 4.081 of 8.
    expect(obstaclesOf(orderOf(lLayout(50, 6)))).toEqual(['slips']);
  });

  it('a long sheet lies with its narrow side to the back, where the side frames leave 400', () => {
    // 2700 is longer than the 2550 between the frames: 600 behind the bend line meet them, 50 do not.
    const long = stripLayout([50, 600], [square], 2700);
    expect(orderOf(long)).toMatchObject({ ok: true, order: [{ gaugedSide: 'parent' }] });
    expect(obstaclesOf(orderOf(stripLayout([450, 600], [square], 2700)))).toEqual(['frames']);
    expect(orderOf(stripLayout([450, 600], [square], 2500)).ok).toBe(true);
  });

  it('flips within 0.05 mm of the least flange', () => {
    // 8 - 2.081 + 4 = 9.919 outside.
    expect(orderOf(lLayout(50, 9.9)).ok).toBe(false);
    expect(orderOf(lLayout(50, 9.94)).ok).toBe(true);
  });
});

describe('the search', () => {
  /** Steps up and down: twenty bends of 90. */
  const stairs = stripLayout(
    Array.from({ length: 21 }, () => 40),
    Array.from({ length: 20 }, (_, index) => ({ ...square, direction: index % 2 === 0 ? 'towards' : 'away' }) as const),
  );

  it('answers for twenty bends within its budget', () => {
    const order = orderOf(stairs);
    expect(order.ok && order.order).toHaveLength(20);
  });

  it('says when it was broken off', () => {
    const order = findBendOrder(developed(stairs, sampleStock()), undefined, 1000);
    expect(order).toEqual({ ok: false, reason: 'budgetSpent', blockedBy: [], testsSpent: 1000 });
  });
});
