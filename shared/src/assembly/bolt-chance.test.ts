import { STANDARD_BRAKE } from '../bending/leg-gains';
import { developed } from '../bending/testing/developed';
import { hatLayout, lLayout, stripLayout, uLayout } from '../bending/testing/sample-layouts';
import type { Layout } from '../bending/layout';
import { turned } from '../bending/testing/random-parts';
import { NO_COAT } from '../spread/causes';
import type { SpreadPlan } from '../spread/causes';
import { spreadOf } from '../spread/spread';
import { withHoles } from '../spread/testing/spread-parts';
import { boltChance, chanceOf, formParts } from './bolt-chance';
import { PatternError, patternModel } from './bolt-pattern';
import type { BoltPattern, PatternModel } from './bolt-pattern';
import { proposeSlot } from './propose-slot';
import type { ProposedSlot } from './propose-slot';

const PLAN: SpreadPlan = { brake: STANDARD_BRAKE, coat: NO_COAT, gauging: new Map() };
const POWDER = { lowMm: 0.06, highMm: 0.12 };
const COATED: SpreadPlan = { ...PLAN, coat: POWDER };

const m6 = (...ids: readonly string[]): BoltPattern => ({
  bolts: ids.map((featureId) => ({ featureId, boltMm: 6, at: null })),
  placeHalfWidthMm: 0,
});

// A hat bolted down through both brims: four bends lie between its holes.
const HAT = withHoles(hatLayout(20, 25, 50, { kFactor: 0.42 }), [
  [10, 20],
  [130, 20],
]);
const HAT_OF_THREE = withHoles(hatLayout(20, 25, 50, { kFactor: 0.42 }), [
  [10, 20],
  [130, 8],
  [130, 32],
]);
const HAT_OF_FOUR = withHoles(hatLayout(20, 25, 50, { kFactor: 0.42 }), [
  [10, 8],
  [130, 8],
  [10, 32],
  [130, 32],
]);

function modelOf(layout: Layout, pattern: BoltPattern, plan = PLAN): PatternModel {
  return patternModel(developed(layout), plan, pattern);
}

/** The layout with a hole made the slot that was proposed. */
function applied(layout: Layout, slot: ProposedSlot): Layout {
  const features = layout.features.map((feature) =>
    feature.id === slot.featureId
      ? ({ kind: 'slot', id: feature.id, from: slot.from, to: slot.to, widthMm: slot.widthMm } as const)
      : feature,
  );
  return { ...layout, features };
}

/** Standard normal distribution. Source: Abramowitz and Stegun 7.1.26, good to 1.5e-7. */
function normalBelow(z: number): number {
  const x = Math.abs(z) / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const poly = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  const tail = (poly * Math.exp(-x * x)) / 2;
  return z < 0 ? tail : 1 - tail;
}

describe('two bolts over a hat', () => {
  // Two bolts in 6.6 mm holes enter while the holes' distance is off by no more than 0.6 mm; the distance is normal to first order
  // with the standard deviation of its closed form, so the chance is 2 * Phi(0.6 / sigma) - 1.
  it('start as often as the spread of their distance says', () => {
    const development = developed(HAT);
    const holes = spreadOf(development, PLAN).find(({ kind }) => kind === 'holes');
    const expected = 2 * normalBelow(0.6 / (holes?.standardDeviationMm ?? NaN)) - 1;
    const { bare } = boltChance(patternModel(development, PLAN, m6('h1', 'h2')), NO_COAT, 5, 8000);
    expect(expected).toBeGreaterThan(0.6);
    expect(expected).toBeLessThan(0.95);
    expect(Math.abs(bare.chance - expected)).toBeLessThan(4 * bare.standardError + 0.005);
    expect(bare.touching).toBe(0);
  });

  // Powder takes 0.09 +- 0.03 mm off each side of each hole: 0.6 becomes 0.6 - 2 * 0.09 = 0.42 mm, the coat common to both holes.
  it('start less often once the holes are coated', () => {
    const development = developed(HAT);
    const sigma = spreadOf(development, PLAN).find(({ kind }) => kind === 'holes')?.standardDeviationMm ?? NaN;
    const { bare, coated } = boltChance(patternModel(development, COATED, m6('h1', 'h2')), POWDER, 5, 8000);
    // The limit itself varies by 2 * 0.015: averaged over it by the three points of a Gauss-Hermite rule.
    const rule = [
      [0, 2 / 3],
      [Math.sqrt(3), 1 / 6],
      [-Math.sqrt(3), 1 / 6],
    ] as const;
    const expected = rule.reduce(
      (sum, [at, weight]) => sum + weight * (2 * normalBelow((0.42 + at * 0.03) / sigma) - 1),
      0,
    );
    expect(Math.abs(coated.chance - expected)).toBeLessThan(4 * coated.standardError + 0.005);
    expect(coated.chance).toBeLessThan(bare.chance - 0.05);
  });

  it('start less often when the bolts are off themselves', () => {
    const at = (placeHalfWidthMm: number): number =>
      boltChance(modelOf(HAT, { ...m6('h1', 'h2'), placeHalfWidthMm }), NO_COAT, 5, 3000).bare.chance;
    expect(at(0.6)).toBeLessThan(at(0) - 0.05);
  });

  it('start only where the bolts are', () => {
    const pattern = (x: number): BoltPattern => ({
      placeHalfWidthMm: 0,
      bolts: [
        { featureId: 'h1', boltMm: 6, at: { x: 0, y: 0 } },
        { featureId: 'h2', boltMm: 6, at: { x, y: 0 } },
      ],
    });
    const development = developed(HAT);
    const planned = spreadOf(development, PLAN).find(({ kind }) => kind === 'holes')?.valueMm ?? NaN;
    const chance = (x: number): number =>
      boltChance(patternModel(development, PLAN, pattern(x)), NO_COAT, 5, 1500).bare.chance;
    expect(chance(planned)).toBeGreaterThan(chance(planned + 0.6));
    expect(chance(planned + 6)).toBe(0);
  });
});

describe('bolts in one panel', () => {
  it('hardly ever miss: only the cut lies between them', () => {
    const plate = withHoles(lLayout(60, 30), [
      [10, 10],
      [40, 10],
      [25, 30],
    ]);
    const { bare } = boltChance(modelOf(plate, m6('h1', 'h2', 'h3')), NO_COAT, 5, 500);
    expect(bare.chance).toBe(1);
  });
});

describe('a proposed slot', () => {
  it.each([
    ['two bolts', HAT, ['h1', 'h2'], 0.99],
    ['three bolts', HAT_OF_THREE, ['h1', 'h2', 'h3'], 0.95],
  ] as const)('over %s, applied, reaches the wanted chance on other parts', (_, layout, ids, wanted) => {
    const parts = formParts(modelOf(layout, m6(...ids), COATED), POWDER, 5, 2000);
    const before = chanceOf(parts, true).chance;
    expect(before).toBeLessThan(wanted);
    const proposal = proposeSlot(parts, wanted);
    if (proposal.kind !== 'slot') throw new Error(`Expected a slot, got ${proposal.kind}`);
    const { slot } = proposal;
    expect(slot.chance.chance).toBeGreaterThan(wanted);
    expect(Math.hypot(slot.to.x - slot.from.x, slot.to.y - slot.from.y)).toBeCloseTo(slot.lengthMm, 9);
    const after = boltChance(modelOf(applied(layout, slot), m6(...ids), COATED), POWDER, 77, 4000).coated;
    expect(after.chance).toBeGreaterThanOrEqual(wanted);
  });

  it('lies along the line between two bolts, and one step less isn’t enough', () => {
    const parts = formParts(modelOf(HAT, m6('h1', 'h2'), COATED), POWDER, 5, 2000);
    const proposal = proposeSlot(parts, 0.99);
    if (proposal.kind !== 'slot') throw new Error(`Expected a slot, got ${proposal.kind}`);
    const { directionDeg, lengthMm, from, to, featureId } = proposal.slot;
    expect(directionDeg).toBe(0);
    const centre = HAT.features.find(({ id }) => id === featureId);
    const middle = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
    expect(centre?.kind === 'hole' && Math.hypot(centre.centre.x - middle.x, centre.centre.y - middle.y)).toBeLessThan(
      1e-9,
    );
    expect(proposeSlot(parts, 0.99, lengthMm - 0.1).kind).toBe('notEnough');
  });

  // The same hat lying at 37 degrees: the slot turns with it, and is as long.
  it('turns with the part', () => {
    const wanted = (layout: Layout): ProposedSlot => {
      const proposal = proposeSlot(formParts(modelOf(layout, m6('h1', 'h2'), COATED), POWDER, 5, 2000), 0.99);
      if (proposal.kind !== 'slot') throw new Error(`Expected a slot, got ${proposal.kind}`);
      return proposal.slot;
    };
    expect(wanted(turned(HAT, 37)).directionDeg).toBe(37);
    expect(Math.abs(wanted(turned(HAT, 37)).lengthMm - wanted(HAT).lengthMm)).toBeLessThan(0.35);
  });

  // Each brim holds two of four bolts and strays as a whole: one slot leaves its neighbour where it was.
  it('in one of four holes is said to be not enough, with the best it could do', () => {
    const parts = formParts(modelOf(HAT_OF_FOUR, m6('h1', 'h2', 'h3', 'h4'), COATED), POWDER, 5, 2000);
    const proposal = proposeSlot(parts, 0.99);
    if (proposal.kind !== 'notEnough') throw new Error(`Expected not enough, got ${proposal.kind}`);
    expect(proposal.best.chance.chance).toBeGreaterThanOrEqual(chanceOf(parts, true).chance);
    expect(proposal.best.chance.chance).toBeLessThan(0.99);
  });

  it('is not proposed where the holes do, nor where nothing is left to slot', () => {
    const plate = withHoles(lLayout(60, 30), [
      [10, 10],
      [40, 10],
    ]);
    const easy = formParts(modelOf(plate, m6('h1', 'h2')), NO_COAT, 5, 500);
    expect(proposeSlot(easy, 0.9)).toMatchObject({ kind: 'notNeeded', chance: { chance: 1 } });
    const slotted = HAT.features.map((feature) =>
      feature.kind === 'hole'
        ? ({
            kind: 'slot',
            id: feature.id,
            from: feature.centre,
            to: { ...feature.centre, y: feature.centre.y + 3 },
            widthMm: 6.6,
          } as const)
        : feature,
    );
    const slots = formParts(modelOf({ ...HAT, features: slotted }, m6('h1', 'h2')), NO_COAT, 5, 500);
    expect(proposeSlot(slots, 0.99).kind).toBe('noHole');
  });

  it.each([0, 1, -0.2, Number.NaN])('is refused for a wanted chance of %s', (wanted) => {
    const parts = formParts(modelOf(HAT, m6('h1', 'h2')), NO_COAT, 5, 10);
    expect(() => proposeSlot(parts, wanted)).toThrow(RangeError);
  });
});

describe('a pattern', () => {
  it('of an unknown hole, of none, or of faces that look different ways is refused by name', () => {
    expect(() => modelOf(HAT, m6('h1', 'h9'))).toThrow(PatternError);
    expect(() => modelOf(HAT, m6())).toThrow('without bolts');
    const l = withHoles(lLayout(50, 30), [
      [15, 20],
      [70, 20],
    ]);
    expect(() => modelOf(l, m6('h1', 'h2'))).toThrow('faces another way');
  });

  it('spans panels that look opposite ways', () => {
    const u = withHoles(uLayout(30, 60), [
      [12, 20],
      [108, 20],
    ]);
    const { bare } = boltChance(modelOf(u, m6('h1', 'h2')), NO_COAT, 5, 500);
    // Seen along the bolts, both holes lie on one line: they are off by what differs in their heights.
    expect(bare.chance).toBeGreaterThan(0.5);
  });
});

describe('a long strip', () => {
  it('of many bends forms without any number lost', () => {
    const strip = withHoles(stripLayout([60, 40, 60], [{ direction: 'towards' }, { direction: 'away' }]), [
      [30, 20],
      [130, 20],
    ]);
    const parts = formParts(modelOf(strip, m6('h1', 'h2')), NO_COAT, 5, 300);
    expect([...parts.holeX, ...parts.holeY, ...parts.boltX, ...parts.boltY].every(Number.isFinite)).toBe(true);
  });
});
