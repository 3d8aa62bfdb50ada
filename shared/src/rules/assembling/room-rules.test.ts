import type { Feature, HolePurpose } from '../../bending/layout';
import { LYING_FLAT } from '../../bending/fold';
import { prism } from '../../brake/prism';
import { applyCommand, applyCommands } from '../../part/apply-command';
import type { Neighbour } from '../../part/assembly';
import type { StockRole } from '../../part/part-document';
import { starterDocument } from '../../part/starter-document';
import { checkPart } from '../check-part';
import {
  ACROSS,
  MENDED,
  add,
  bracket,
  found,
  hole,
  outcomeOfMending,
  plain,
  plate,
  severities,
} from '../testing/rule-bench';
import { assembled } from './testing/assembled';
import { swingDeg } from './tool-room';

const M6: HolePurpose = { kind: 'clearance', thread: 'M6', fit: 'medium' };

/** A block with its lower corner and its upper one. */
function block(id: string, min: readonly [number, number, number], max: readonly [number, number, number]): Neighbour {
  const at = ([x, y, z]: readonly [number, number, number]) => ({ x, y, z });
  return { kind: 'box', id, name: id, min: at(min), max: at(max) };
}

/** What it sits on, half a millimetre below, so that bolts have to go in from face A. */
const SEAT = block('seat', [-50, -50, -60], [150, 150, -0.5]);

describe('washerNotSeated', () => {
  const withHole = (...features: readonly Feature[]) => assembled(add(bracket(), ...features));

  it('keeps half a washer off the tangent line', () => {
    // Outside apex at 60, R + T = 4.6: the base is flat up to 55.4. An M6 washer is 12 across.
    expect(found(withHole(hole('h1', 49.36, 25, M6)), 'washerNotSeated')).toEqual([]);
    const [finding] = found(withHole(hole('h1', 49.44, 25, M6)), 'washerNotSeated');
    expect(finding).toMatchObject({ severity: 'caution', title: 'Washer of H1 rides on bend B1', ids: ['h1', 'b1'] });
    expect(finding?.foundMm).toBeCloseTo(5.96, 6);
  });

  it('keeps it off edges and other openings', () => {
    expect(found(withHole(hole('h1', 20, 6.04, M6)), 'washerNotSeated')).toEqual([]);
    expect(found(withHole(hole('h1', 20, 5.96, M6)), 'washerNotSeated')[0]?.title).toBe(
      'Washer of H1 overhangs the edge',
    );
    const beside = (x: number) => withHole(hole('h1', 20, 25, M6), hole('h2', x, 25, plain(14)));
    expect(found(beside(33.04), 'washerNotSeated')).toEqual([]);
    expect(found(beside(32.96), 'washerNotSeated')[0]).toMatchObject({
      title: 'Washer of H1 runs over H2',
      ids: ['h1', 'h2'],
    });
  });

  it('looks at both ends of a bolted slot, and at nothing without an assembly', () => {
    const slot = (toX: number): Feature => ({
      kind: 'slot',
      id: 's1',
      from: { x: 30, y: 25 },
      to: { x: toX, y: 25 },
      widthMm: 6.6,
    });
    expect(found(withHole(slot(49.36)), 'washerNotSeated')).toEqual([]);
    expect(severities(withHole(slot(49.44)), 'washerNotSeated')).toEqual(['caution']);
    expect(found(add(bracket(), slot(49.44), hole('h1', 20, 5, M6)), 'washerNotSeated')).toEqual([]);
  });

  it('is mended by moving the hole in', () => {
    expect(outcomeOfMending(withHole(hole('h1', 20, 5.5, M6)), 'washerNotSeated')).toEqual(MENDED);
    expect(outcomeOfMending(withHole(hole('h1', 49.9, 25, M6)), 'washerNotSeated')).toEqual(MENDED);
  });
});

describe('noRoomForFastener', () => {
  const bolted = (x: number, ...neighbours: readonly Neighbour[]) =>
    assembled(add(bracket(), hole('h1', x, 25, M6)), { neighbours: [SEAT, ...neighbours] });

  it('keeps a socket clear of the bend’s inside radius and the flange', () => {
    // Socket 1.25 x 10 + 2.2 = 14.7, 1 mm of air: 8.35. It stands on a washer of 1.6; there the inside radius of 2.6 has come
    // sqrt(2.6² - 1²) = 2.4 past the tangent line at 55.4. A ring is 15 wide and fits no better.
    const limit = 55.4 + 2.4 - 8.35;
    expect(severities(bolted(limit - 0.05), 'noRoomForFastener')).toEqual(['hint']);
    const [finding] = found(bolted(limit + 0.05), 'noRoomForFastener');
    expect(finding).toMatchObject({ severity: 'caution', title: 'Neither socket nor spanner gets at H1', ids: ['h1'] });
    expect(finding?.requiredMm).toBeCloseTo(8.35, 9);
    expect(Math.abs((finding?.foundMm ?? 0) - 8.3)).toBeLessThan(0.05);
  });

  it('keeps the head clear of it: a sharp hex of 10 is 11.547 over its corners', () => {
    const limit = 55.4 + 2.4 - 5.7735;
    expect(severities(bolted(limit - 0.05), 'noRoomForFastener')).toEqual(['caution']);
    const [finding] = found(bolted(limit + 0.05), 'noRoomForFastener');
    expect(finding).toMatchObject({ severity: 'blocker', title: 'No room for the M6 head at H1' });
  });

  it('takes the other face where that one works, and says which', () => {
    const free = (x: number) => assembled(add(bracket(), hole('h1', x, 25, M6)));
    expect(found(free(20), 'noRoomForFastener')).toEqual([]);
    expect(found(free(52), 'noRoomForFastener')).toMatchObject([
      { severity: 'hint', title: 'The bolt of H1 goes in from face B', mend: null },
    ]);
    const two = assembled(add(bracket(), hole('h1', 20, 25, M6), hole('h2', 20, 40, M6)), { neighbours: [SEAT] });
    expect(found(two, 'noRoomForFastener').map(({ title }) => title)).toEqual(['Bolts of H1 and H2 go in from face A']);
  });

  it('takes a spanner under a ceiling, where a socket does not fit', () => {
    // From face A: washer 1.6, nut 5.2, ring lifted off 2 x 5.2 + 2; socket and ratchet 55.
    const under = (heightMm: number) =>
      assembled(add(plate(60, 50), hole('h1', 30, 25, M6)), {
        neighbours: [SEAT, block('ceiling', [-50, -50, 2 + heightMm], [150, 150, 90])],
      });
    expect(found(under(56.64), 'noRoomForFastener')[0]?.detail).not.toContain('spanner');
    expect(found(under(56.56), 'noRoomForFastener')[0]?.detail).toContain('H1: by spanner only');
    expect(severities(under(14.04), 'noRoomForFastener')).toEqual(['hint']);
    expect(severities(under(13.96), 'noRoomForFastener')).toEqual(['caution']);
    expect(severities(under(6.84), 'noRoomForFastener')).toEqual(['caution']);
    expect(severities(under(6.76), 'noRoomForFastener')).toEqual(['blocker']);
  });

  it('lets a spanner swing 60°', () => {
    const wall = (min: readonly [number, number], max: readonly [number, number]) =>
      prism(
        LYING_FLAT,
        [
          { x: min[0], y: min[1] },
          { x: max[0], y: min[1] },
          { x: max[0], y: max[1] },
          { x: min[0], y: max[1] },
        ],
        0,
        20,
      );
    const arm = { lengthMm: 120, halfWidthMm: 4, low: 4, high: 14 };
    expect(swingDeg(LYING_FLAT, [], arm)).toBe(360);
    expect(swingDeg(LYING_FLAT, [wall([10, -300], [20, 300])], arm)).toBe(180);
    expect(swingDeg(LYING_FLAT, [wall([-300, 10], [300, 20]), wall([-300, -20], [300, -10])], arm)).toBe(0);
    // An arm of 120, 4 to either side, beside a wall at 10 reaches in at asin(6 / 120) = 2.9°.
    expect(swingDeg(LYING_FLAT, [wall([10, -300], [20, 300]), wall([-300, 10], [300, 20])], arm)).toBe(90);
  });

  it('is mended by moving the hole clear', () => {
    for (const x of [49.8, 52.3]) {
      const document = bolted(x);
      const [finding] = found(document, 'noRoomForFastener');
      const after = applyCommands(document, finding?.mend?.commands ?? []);
      expect(outcomeOfMending(document, 'noRoomForFastener').newBlockers).toBe(0);
      expect(finding?.mend).not.toBeNull();
      expect(severities(after, 'noRoomForFastener')).not.toContain(finding?.severity);
    }
  });

  it('offers no way where the bolt runs into something or along its edge', () => {
    for (const x of [10, 20]) {
      const part = bolted(20, block('post', [x, 10, 3], [x + 10, 40, 90]));
      expect(found(part, 'noRoomForFastener')).toMatchObject([{ severity: 'blocker', foundMm: 0, mend: null }]);
    }
  });

  it('says nothing without an assembly', () => {
    expect(found(add(bracket(), hole('h1', 52, 25, M6)), 'noRoomForFastener')).toEqual([]);
  });
});

describe('neighbourFouled', () => {
  const beside = (neighbour: Neighbour, finishId = 'bare') =>
    assembled(bracket(), { finishId, neighbours: [neighbour] });
  // The flange stands up to z = 40 outside, from x = 58 to 60.
  const above = (gapMm: number) => block('roof', [40, -10, 40 + gapMm], [80, 60, 60 + gapMm]);
  const below = (gapMm: number) => block('floor', [0, 0, -20 - gapMm], [20, 50, -gapMm]);

  it('is a blocker with its depth where both share room', () => {
    const [finding] = found(beside(above(-0.06)), 'neighbourFouled');
    expect(finding).toMatchObject({ severity: 'blocker', title: 'It runs into roof', ids: ['b1'] });
    expect(finding?.foundMm).toBeCloseTo(-0.06, 6);
    expect(severities(beside(above(0.04)), 'neighbourFouled')).toEqual(['caution']);
    expect(found(beside(below(-3)), 'neighbourFouled')[0]?.foundMm).toBeCloseTo(-3, 6);
  });

  it('wants 1 mm of air by the base, and the coat', () => {
    expect(severities(beside(below(0.96)), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(beside(below(1.04)), 'neighbourFouled')).toEqual([]);
    expect(severities(beside(below(1.08), 'powder-moss'), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(beside(below(1.16), 'powder-moss'), 'neighbourFouled')).toEqual([]);
  });

  it('wants as much as the tip may be off by a flange', () => {
    // Outside face of the flange at x = 60. 1° at 35 mm over the bend's middle is some 0.65 mm, the rest gauging and radius.
    const outside = (gapMm: number) => block('wall', [60 + gapMm, 10, 20], [90, 40, 60]);
    const requiredMm = found(beside(outside(0.5)), 'neighbourFouled')[0]?.requiredMm ?? NaN;
    expect(requiredMm).toBeGreaterThanOrEqual(1);
    expect(requiredMm).toBeLessThan(2);
    expect(severities(beside(outside(requiredMm - 0.04)), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(beside(outside(requiredMm + 0.04)), 'neighbourFouled')).toEqual([]);
  });

  it('wants more by a long flange, whose tip strays farther', () => {
    const shape = { shape: 'l-bracket', baseMm: 200, flangeMm: 900, widthMm: 100, bendAngleDeg: 90 } as const;
    const tall = applyCommand(starterDocument(shape), { kind: 'setStock', role: 'production', stock: ACROSS });
    const by = (gapMm: number) =>
      assembled(tall, { neighbours: [block('wall', [200 + gapMm, -50, 20], [300, 150, 1200])] });
    const requiredMm = found(by(5), 'neighbourFouled')[0]?.requiredMm ?? NaN;
    // 1° at 900 mm is 15.7 mm.
    expect(Math.abs(requiredMm - 15.7)).toBeLessThan(0.5);
    expect(severities(by(requiredMm - 0.04), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(by(requiredMm + 0.04), 'neighbourFouled')).toEqual([]);
  });

  it('measures to cylinders as they are', () => {
    const rod = (gapMm: number): Neighbour => ({
      kind: 'cylinder',
      id: 'rod',
      name: 'rod',
      from: { x: 25, y: -30, z: -10 - gapMm },
      to: { x: 25, y: 90, z: -10 - gapMm },
      radiusMm: 10,
    });
    expect(severities(beside(rod(1.04)), 'neighbourFouled')).toEqual([]);
    expect(severities(beside(rod(0.96)), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(beside(rod(-0.06)), 'neighbourFouled')).toEqual(['blocker']);
    expect(found(beside(rod(-2)), 'neighbourFouled')[0]?.foundMm).toBeCloseTo(-2, 1);
  });

  it('lets a rod through a hole', () => {
    const through = (radiusMm: number): Neighbour => ({
      kind: 'cylinder',
      id: 'rod',
      name: 'rod',
      from: { x: 25, y: 25, z: -30 },
      to: { x: 25, y: 25, z: 30 },
      radiusMm,
    });
    const holed = (radiusMm: number) =>
      assembled(add(bracket(), hole('h1', 25, 25, plain(20))), { neighbours: [through(radiusMm)] });
    expect(severities(holed(8.9), 'neighbourFouled')).toEqual([]);
    expect(severities(holed(9.1), 'neighbourFouled')).toEqual(['caution']);
    expect(severities(holed(10.2), 'neighbourFouled')).toEqual(['blocker']);
  });

  it('is mended by shortening the flange', () => {
    for (const gapMm of [-2, 0.3]) {
      expect(outcomeOfMending(beside(above(gapMm)), 'neighbourFouled')).toEqual(MENDED);
    }
    // A wall across the bend can't be escaped that way.
    expect(found(beside(block('wall', [59, 10, -5], [90, 40, 60])), 'neighbourFouled')[0]?.mend).toBeNull();
  });

  it('looks at both sheets, the trial one bare, and at nothing without neighbours', () => {
    const fouledIn = (role: StockRole, gapMm: number) =>
      checkPart(beside(below(gapMm), 'powder-moss'), role).filter(({ rule }) => rule === 'neighbourFouled').length;
    expect([fouledIn('trial', 0.96), fouledIn('production', 0.96)]).toEqual([1, 1]);
    expect([fouledIn('trial', 1.06), fouledIn('production', 1.06)]).toEqual([0, 1]);
    expect(found(assembled(bracket()), 'neighbourFouled')).toEqual([]);
  });
});
