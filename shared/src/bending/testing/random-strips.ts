import fc from 'fast-check';
import type { BendingStock } from '../development';
import type { Layout } from '../layout';
import { sampleStock, stripLayout } from './sample-layouts';
import type { SampleBend } from './sample-layouts';

/** A random strip: legs long enough for their bends, up to five bends of mixed angles and directions. */
export interface RandomStrip {
  readonly legsMm: readonly number[];
  readonly bends: readonly SampleBend[];
  readonly widthMm: number;
  readonly stock: BendingStock;
}

const mm = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });

const bend = (maxAngleDeg: number): fc.Arbitrary<SampleBend> =>
  fc.record({
    bendAngleDeg: fc.oneof(fc.constant(90), mm(5, maxAngleDeg)),
    direction: fc.constantFrom('towards' as const, 'away' as const),
    reference: fc.constantFrom(
      'outsideApex' as const,
      'insideApex' as const,
      'outsideTangent' as const,
      'tangent' as const,
    ),
    kFactor: mm(0.1, 0.5),
  });

/** Strips with legs of 30 to 90 mm, in sheet of 0.5 to 3 mm with radii up to 3 mm, bends up to `maxAngleDeg`. */
export function randomStrip(maxAngleDeg = 130): fc.Arbitrary<RandomStrip> {
  return fc
    .record({
      bends: fc.array(bend(maxAngleDeg), { minLength: 1, maxLength: 5 }),
      legs: fc.array(mm(30, 90), { minLength: 6, maxLength: 6 }),
      widthMm: mm(10, 80),
      thicknessMm: mm(0.5, 3),
      deliveredRadiusMm: mm(0.3, 3),
    })
    .map(({ bends, legs, widthMm, thicknessMm, deliveredRadiusMm }) => ({
      legsMm: legs.slice(0, bends.length + 1),
      bends,
      widthMm,
      stock: sampleStock({ thicknessMm, deliveredRadiusMm }),
    }));
}

/** The layout of a random strip with one of its legs as the base. */
export function stripOf(strip: RandomStrip, basePanel = 0): Layout {
  return stripLayout(strip.legsMm, strip.bends, strip.widthMm, basePanel);
}
