import type { Confidence, Provenance } from '../bending/development';
import type { TableSource } from '../stock/figure';

/** Limits compare with this slack, mm, so that a size set to the limit passes whatever rounding did to it. */
export const LIMIT_SLACK_MM = 1e-6;

function rule(
  text: string,
  source = 'common practice, no source',
  confidence: Confidence = 'common-practice',
): Provenance {
  return { text, source, confidence };
}

/** A tabled source in the words of a finding. */
export function ruleFrom(text: string, { source, confidence }: TableSource): Provenance {
  return { text, source, confidence };
}

/** Openings keep this many thicknesses from a bend's tangent line: R + 2 T from the inside face, R + 3 T from the outside. */
export const TANGENT_DISTANCE = { overT: 2, why: rule('2 T from the tangent line') } as const;

/** Openings keep out of the die's mouth: half its opening from the bend's centre. */
export const DIE_MOUTH = { shareOfV: 0.5, why: rule('half the die’s opening from the bend’s centre') } as const;

/** Smallest hole and slot a laser cuts well, and how small thin steel allows. */
export const SMALLEST_CUT = {
  overT: 1,
  thinSteelOverT: 0.5,
  thinSteelUpToMm: 6,
  smallestHoleMm: 0.5,
  smallestSlotMm: 1,
  why: rule('a laser hole of 1 T or more, in steel up to 6 mm no less than 0.5 T'),
  slotWhy: rule('a laser slot of 1 T or 1 mm, whichever is more'),
} as const;

/** Metal left between two cuts. */
export const LAND = {
  overT: 1,
  smallestMm: 1,
  why: rule('a land of 1 T or 1 mm, whichever is more, for laser cutting'),
} as const;

/** Reliefs: width, and depth past the tangent line. */
export const RELIEF = {
  widthOverT: 1,
  smallestWidthMm: 1,
  why: rule('a relief 1 T (at least 1 mm) wide that reaches R + T past the tangent line'),
} as const;

/** Bends along the grain, or with the grain unknown, need this much more radius; the trade says 1.5 to 2. */
export const ALONG_GRAIN = { factor: 1.5, acrossFromDeg: 45 } as const;

/** A sheet may be this much thicker than a row of a radius table and still count to it (3.2 mm to 1/8 in). */
export const NOMINAL_THICKNESS_SLACK = 1.02;
