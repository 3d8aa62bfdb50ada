import type { CardTemplate } from '../../card';
import type { BendingStock } from '../../development';
import type { Layout } from '../../layout';
import { sampleStock } from '../sample-layouts';

/**
 * A part that people bend on a brake, with its sizes worked out by hand. The arithmetic stands beside each part and uses plane
 * geometry only: BA = rad(A) (R + K T), setback (R + T) tan(A/2) outside, R tan(A/2) inside, R + T or R to the outermost point.
 */
export interface NamedPart {
  readonly name: string;
  readonly stock: BendingStock;
  readonly layout: Layout;
  readonly template?: CardTemplate;
  /** Blank along x and y. */
  readonly flatMm: readonly [number, number];
  /** Formed part along the axes of its base panel. */
  readonly formedMm: readonly [number, number, number];
  /** Of the blank, net of openings. */
  readonly areaMm2?: number;
  /** Middles of holes in the blank. */
  readonly holesMm?: Readonly<Record<string, readonly [number, number]>>;
  /** Reliefs that are cut by themselves, 0 when not given. */
  readonly reliefs?: number;
}

function sheet(thicknessMm: number, deliveredRadiusMm: number, kFactor: number): BendingStock {
  const row = { ratioFrom: 0, ratioTo: null, kFactor, source: 'chosen for the test', confidence: 'entered' } as const;
  return sampleStock({ thicknessMm, deliveredRadiusMm, kTable: [row] });
}

/**
 * T 2, R 2, K 0.33, so the neutral line runs at 2.66.
 * 90: BA 1.570796 x 2.66 = 4.178318, outside 4, inside 2, deduction outside 8 - 4.178318 = 3.821682, inside 4 - 4.178318 = -0.178318.
 */
export const MILD = sheet(2, 2, 0.33);

/** T 1.5, R 1.5, K 0.42, neutral line at 2.13. 90: BA 3.345796, outside 3, deduction outside 6 - 3.345796 = 2.654204. */
export const THIN = sheet(1.5, 1.5, 0.42);

/** T 3, R 4.5, K 0.41, neutral line at 5.73. 90: BA 9.000663, outside 7.5, inside 4.5, deduction outside 15 - 9.000663 = 5.999337. */
export const ALLOY = sheet(3, 4.5, 0.41);
