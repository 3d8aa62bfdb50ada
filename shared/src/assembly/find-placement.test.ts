import fc from 'fast-check';
import { seededNumbers } from '../spread/seeded-normal';
import { findPlacement } from './find-placement';
import { entersByBruteForce, fitOf, outsideAfter } from './testing/bolt-fits';
import type { FitRow } from './testing/bolt-fits';

const M6_PLAY = 0.3;

/** Two M6 in 6.6 mm holes, the holes so much farther apart than the bolts. */
function pair(offMm: number): readonly FitRow[] {
  return [
    { bolt: [0, 0], hole: [0, 0], play: M6_PLAY },
    { bolt: [60, 0], hole: [60 + offMm, 0], play: M6_PLAY },
  ];
}

const answerOf = (rows: readonly FitRow[]): string => findPlacement(fitOf(rows)).answer;

describe('two bolts', () => {
  it.each([0, 0.3, -0.3, 0.599, -0.599])('enter holes %s mm off', (offMm) => {
    expect(answerOf(pair(offMm))).toBe('enters');
  });

  it.each([0.601, -0.601, 3])('don’t enter holes %s mm off', (offMm) => {
    expect(answerOf(pair(offMm))).toBe('none');
  });

  it('enter whatever way the part lies', () => {
    const rows: readonly FitRow[] = [
      { bolt: [100, -40], hole: [7, 9], play: M6_PLAY },
      { bolt: [100, 20], hole: [7 - 60.5, 9], play: M6_PLAY },
    ];
    const placement = findPlacement(fitOf(rows));
    expect(placement.answer).toBe('enters');
    expect(placement.answer === 'enters' && outsideAfter(rows, placement.motion)).toBeLessThan(0);
  });

  // Centre distance normal with sigma 0.41 mm; both bolts enter while it is off by no more than 0.3 + 0.3 = 0.6 mm:
  // P = 2 * Phi(0.6 / 0.41) - 1 = 2 * Phi(1.46341) - 1 = erf(1.46341 / sqrt 2) = erf(1.03479).
  // By integration of the normal density, Simpson's rule over -0.6 to 0.6 mm: 0.8566.
  it('in 6.6 mm holes with sigma 0.41 mm enter with chance 0.8566', () => {
    const sigma = 0.41;
    const density = (x: number): number => Math.exp(-(x ** 2) / (2 * sigma ** 2)) / (sigma * Math.sqrt(2 * Math.PI));
    const steps = 200;
    const width = 1.2 / steps;
    let integral = 0;
    for (let step = 0; step <= steps; step += 1) {
      const weight = step === 0 || step === steps ? 1 : step % 2 === 1 ? 4 : 2;
      integral += (weight * density(-0.6 + step * width) * width) / 3;
    }
    expect(integral).toBeCloseTo(0.8566, 4);
    const count = 20_000;
    const numbers = seededNumbers(6);
    let entering = 0;
    for (let part = 0; part < count; part += 1) {
      if (answerOf(pair(numbers.normal() * sigma)) === 'enters') entering += 1;
    }
    // Four standard errors: 4 * sqrt(0.8566 * 0.1434 / 20000) = 0.0099.
    expect(Math.abs(entering / count - integral)).toBeLessThan(0.0099);
  });
});

describe('three bolts and more', () => {
  const numbers = seededNumbers(33);
  const randomRows = (count: number, sigma: number): readonly FitRow[] =>
    Array.from({ length: count }, (): FitRow => {
      const [x, y] = [80 * numbers.uniform(), 80 * numbers.uniform()];
      const play = 0.15 + 0.3 * numbers.uniform();
      return { bolt: [x, y], hole: [x + sigma * numbers.normal(), y + sigma * numbers.normal()], play };
    });

  it.each([3, 4])('agree with brute force, %s bolts', (count) => {
    const tally = { enters: 0, none: 0, touching: 0 };
    for (let run = 0; run < 120; run += 1) {
      const rows = randomRows(count, 0.28);
      const placement = findPlacement(fitOf(rows));
      tally[placement.answer] += 1;
      if (placement.answer === 'enters') expect(outsideAfter(rows, placement.motion)).toBeLessThanOrEqual(1e-9);
      // Steps of 0.005 degrees move a bolt 80 mm out by 7 micrometres: grown by 8, brute force must find what there is to find,
      // and without growing it must find nothing where nothing is.
      const grown = rows.map((row) => ({ ...row, play: row.play + 0.008 }));
      if (placement.answer === 'enters') expect(entersByBruteForce(grown, 0.005, 3)).toBe(true);
      else expect(entersByBruteForce(rows, 0.005, 3)).toBe(false);
    }
    expect(tally.enters).toBeGreaterThan(15);
    expect(tally.none).toBeGreaterThan(15);
    expect(tally.touching).toBe(0);
  });

  // A triangle of 60 mm whose holes all lie 0.5 mm farther out than 0.3 of play: only the turn could help, and it doesn't.
  it('know a ring that is too wide', () => {
    const ring = (outMm: number): readonly FitRow[] =>
      [90, 210, 330].map((angleDeg): FitRow => {
        const [cosine, sine] = [Math.cos((angleDeg * Math.PI) / 180), Math.sin((angleDeg * Math.PI) / 180)];
        const hole = [(40 + outMm) * cosine, (40 + outMm) * sine] as const;
        return { bolt: [40 * cosine, 40 * sine], hole, play: M6_PLAY };
      });
    expect(answerOf(ring(0.299))).toBe('enters');
    expect(answerOf(ring(0.301))).toBe('none');
  });

  // Least squares puts the odd hole's error on all four bolts; the best placement needs a motion it doesn't find.
  it('enter where the motion of least squares leaves one out', () => {
    const rows: readonly FitRow[] = [
      { bolt: [0, 0], hole: [0, 0], play: 0.3 },
      { bolt: [50, 0], hole: [50, 0], play: 0.3 },
      { bolt: [50, 50], hole: [50, 50], play: 0.3 },
      { bolt: [0, 50], hole: [0.55, 50], play: 0.3 },
    ];
    const placement = findPlacement(fitOf(rows));
    expect(placement.answer).toBe('enters');
    expect(placement.answer === 'enters' && outsideAfter(rows, placement.motion)).toBeLessThanOrEqual(0);
  });

  it('always enter where a hidden motion takes them, and say how', () => {
    const number = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
    const row = fc.record({
      x: number(-80, 80),
      y: number(-80, 80),
      play: number(0.05, 0.5),
      out: number(0, 0.95),
      toDeg: number(0, 360),
      lengthMm: fc.oneof(fc.constant(0), number(0, 6)),
      directionDeg: number(0, 180),
    });
    fc.assert(
      fc.property(
        fc.array(row, { minLength: 2, maxLength: 8 }),
        number(-180, 180),
        number(-50, 50),
        (spots, turnDeg, shift) => {
          const [cosine, sine] = [Math.cos((turnDeg * Math.PI) / 180), Math.sin((turnDeg * Math.PI) / 180)];
          const rows = spots.map(({ x, y, play, out, toDeg, lengthMm, directionDeg }): FitRow => {
            // The bolt's true place in its opening: somewhere along the slot, and less than its play beside it.
            const along = (lengthMm / 2) * Math.cos((toDeg * Math.PI) / 180);
            const hx = x * cosine - y * sine + shift + along * Math.cos((directionDeg * Math.PI) / 180);
            const hy = x * sine + y * cosine - shift + along * Math.sin((directionDeg * Math.PI) / 180);
            const beside = play * out;
            return {
              bolt: [x, y],
              hole: [hx + beside * Math.cos((toDeg * Math.PI) / 180), hy + beside * Math.sin((toDeg * Math.PI) / 180)],
              play,
              slot: { lengthMm, directionDeg },
            };
          });
          const placement = findPlacement(fitOf(rows));
          expect(placement.answer).toBe('enters');
          if (placement.answer === 'enters') expect(outsideAfter(rows, placement.motion)).toBeLessThanOrEqual(1e-9);
        },
      ),
      { numRuns: 1000 },
    );
  });
});

describe('openings', () => {
  it('that are slots take what they reach, and no more', () => {
    const slotted = (offMm: number): string =>
      answerOf([
        { bolt: [0, 0], hole: [0, 0], play: M6_PLAY },
        { bolt: [60, 0], hole: [60 + offMm, 0], play: M6_PLAY, slot: { lengthMm: 2, directionDeg: 0 } },
      ]);
    // 0.3 + 0.3 of play and 1 to each side.
    expect(slotted(1.599)).toBe('enters');
    expect(slotted(-1.599)).toBe('enters');
    expect(slotted(1.601)).toBe('none');
  });

  it('along the wrong line help nothing', () => {
    const rows: readonly FitRow[] = [
      { bolt: [0, 0], hole: [0, 0], play: M6_PLAY },
      { bolt: [60, 0], hole: [61, 0], play: M6_PLAY, slot: { lengthMm: 2, directionDeg: 90 } },
    ];
    expect(answerOf(rows)).toBe('none');
  });

  it('narrower than their bolt take none, a single one takes any place', () => {
    expect(answerOf([{ bolt: [0, 0], hole: [9, 9], play: -0.01 }])).toBe('none');
    expect(answerOf([{ bolt: [0, 0], hole: [9, 9], play: 0 }])).toBe('enters');
    expect(answerOf([])).toBe('enters');
  });

  it('that bolts share leave no turn to look for', () => {
    const stacked: readonly FitRow[] = [
      { bolt: [5, 5], hole: [0, 0], play: 0.3 },
      { bolt: [5, 5], hole: [0.5, 0], play: 0.3 },
    ];
    expect(answerOf(stacked)).toBe('enters');
  });
});
