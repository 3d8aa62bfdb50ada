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

/** Reliefs: width, and depth past the tangent line. A notch wider than 4 T is the panel's own shape. */
export const RELIEF = {
  widestOverT: 4,
  widthOverT: 1,
  smallestWidthMm: 1,
  why: rule('a relief 1 T (at least 1 mm) wide that reaches R + T past the tangent line'),
} as const;

/** Bends along the grain, or with the grain unknown, need this much more radius; the trade says 1.5 to 2. */
export const ALONG_GRAIN = { factor: 1.5, acrossFromDeg: 45 } as const;

/** A sheet may be this much thicker than a row of a radius table and still count to it (3.2 mm to 1/8 in). */
export const NOMINAL_THICKNESS_SLACK = 1.02;

/** A cut takes half its width off either side, so no inside corner is tighter; a rounding of 1 T takes the notch out of it. */
export const INSIDE_CORNER = {
  shareOfKerf: 0.5,
  roundingOverT: 1,
  smallestRoundingMm: 1,
  why: rule('inside corners have half the cut’s width for a radius, at least'),
} as const;

/** Metal that holds a piece inside an opening. */
export const BRIDGE = {
  overT: 1,
  smallestMm: 1.5,
  why: rule('a bridge of 1 T or 1.5 mm, whichever is more, holds what is inside an opening'),
} as const;

/** What a usual cutting service takes: a sheet of 3000 x 1500 with its margin, and what lies firmly on the slats. */
export const CUTTING_BED = {
  longMm: 2980,
  shortMm: 1480,
  smallestMm: 15,
  why: rule('a sheet of 3000 × 1500 mm less a margin of 10 all round'),
  slatsWhy: rule('blanks narrower than 15 mm tip or fall between the slats'),
} as const;

/** The press brake that is assumed until the shop says which it has: 3 m and 100 t, as jobbing shops have. */
export const BRAKE = {
  lengthMm: 3000,
  forceKn: 1000,
  why: rule('a press brake of 3 m and 1000 kN, as jobbing shops have'),
  forceWhy: rule('1.6 × tensile strength × length × T² / V, against a brake of 1000 kN'),
} as const;

/** Die openings over thickness that shops bend over. */
export const DIE_OPENING = {
  lowestOverT: 6,
  highestOverT: 12,
  why: rule('a V of 6 to 12 T, 8 T to start from'),
} as const;

/** Etched lettering: a laser leaves a line of about 0.3 mm, and a letter is read from 8 lines up. */
export const ETCHED_TEXT = {
  strokeMm: 0.3,
  heightOverStroke: 8,
  why: rule('letters 8 lines high; an etched line is about 0.3 mm wide'),
  placeWhy: rule('lettering keeps to flat metal, clear of bends, edges and openings'),
  coatWhy: rule('powder coat is several times thicker than an etched line is deep'),
} as const;

/** An asked radius may miss the delivered one by this much: 0.2 mm on the blank of a square bend, less than gauging. */
export const DELIVERED_RADIUS = {
  withinMm: 0.5,
  why: rule('an air bend takes its radius from the V opening and the metal, or from a larger punch'),
} as const;

/** A gap under a flange that its bolts still pull shut, mm. */
export const SEAT_GAP = {
  withinMm: 0.1,
  why: rule('a flange stands off by (R − r)(1 − cos A) when one side lies flat', 'plane geometry', 'published'),
} as const;

/** Longest sides between which brackets are found; beyond, a length was most likely read in the other unit. */
export const USUAL_SIZE = {
  smallestMm: 12,
  largestMm: 2500,
  why: rule('brackets are between 12 mm and 2.5 m; an inch is 25.4 mm'),
} as const;

/** Things nearer to each other than this are one thing drawn twice, mm; cuts cannot tell them apart. */
export const DRAWN_TWICE = { withinMm: 0.05, why: rule('what is drawn twice is cut or bent twice') } as const;

/** Shortest edge that is drawn on purpose, mm; up to the width of the cut an edge does not show. */
export const TINY_EDGE = {
  belowMm: 0.05,
  why: rule('edges shorter than the cut is wide do not show in metal'),
} as const;
