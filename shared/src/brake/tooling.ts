import type { Point } from '../geometry/point';
import { commonPractice } from '../stock/figure';
import { radiansFromDeg } from '../units/angle';

/**
 * Cross-sections of tools and machine in the plane across the bend: x across the brake, behind the bend line positive; y up;
 * mm. A punch has its tip at the origin, a die the middle of its mouth. Every profile is given as convex polygons, counter-clockwise.
 * All sizes are common practice, no source: profiles of this kind are what any jobbing shop has.
 */
export type Profile = readonly (readonly Point[])[];

export type PunchId = 'straight' | 'gooseneck' | 'acute';

export interface Punch {
  readonly id: PunchId;
  /** Angle between the flanks of its tip, degrees: it bends to no smaller included angle. */
  readonly tipAngleDeg: number;
  /** Front and back are alike, so that turning it about changes nothing. */
  readonly isSymmetric: boolean;
  /** Its polygons for a tip of that radius. */
  readonly profile: (tipRadiusMm: number) => Profile;
}

export interface Die {
  /** "v16-88": opening and included angle of the groove. */
  readonly id: string;
  readonly openingMm: number;
  readonly profile: Profile;
}

/** From the punch's tip to the ram, mm. */
export const PUNCH_HEIGHT_MM = commonPractice(120).value;
/** Height of the upper part by which the ram holds a punch, and half its width, mm. */
const CLAMP = { heightMm: commonPractice(25).value, halfMm: commonPractice(13).value } as const;
/** Half the width of straight and acute punches above the tip, mm. */
const BODY_HALF_MM = commonPractice(6).value;
/** Sharpest usual tip, mm; a smaller inside radius takes a tip of its own. */
export const TIP_RADIUS_MM = commonPractice(0.8).value;

/** Half of the ram's thickness, and how far it reaches up, mm. */
const RAM = { halfMm: commonPractice(40).value, reachMm: commonPractice(1200).value } as const;
/** Die holder and bed below the die: half widths, and how far down, mm. */
const HOLDER = { halfMm: commonPractice(30).value, heightMm: commonPractice(40).value } as const;
const BED = { halfMm: commonPractice(60).value, reachMm: commonPractice(900).value } as const;
/** Side frames: distance between them, and depth of the throat behind the bend line, mm. */
export const FRAMES = { betweenMm: commonPractice(2550).value, throatMm: commonPractice(400).value } as const;

const box = (left: number, right: number, bottom: number, top: number): readonly Point[] => [
  { x: left, y: bottom },
  { x: right, y: bottom },
  { x: right, y: top },
  { x: left, y: top },
];

const clamp = box(-CLAMP.halfMm, CLAMP.halfMm, PUNCH_HEIGHT_MM - CLAMP.heightMm, PUNCH_HEIGHT_MM);

/** Where the right flank of a rounded tip starts, and where it has come to at a distance from the middle. */
function flank(tipAngleDeg: number, radiusMm: number): { readonly start: Point; readonly at: (x: number) => Point } {
  const half = radiansFromDeg(tipAngleDeg / 2);
  const start = { x: radiusMm * Math.cos(half), y: radiusMm * (1 - Math.sin(half)) };
  return { start, at: (x) => ({ x, y: start.y + (x - start.x) / Math.tan(half) }) };
}

const mirror = ({ x, y }: Point): Point => ({ x: -x, y });
const TIP: Point = { x: 0, y: 0 };

function straightPunch(id: PunchId, tipAngleDeg: number): Punch {
  return {
    id,
    tipAngleDeg,
    isSymmetric: true,
    profile: (tipRadiusMm) => {
      const { start, at } = flank(tipAngleDeg, tipRadiusMm);
      const shoulder = at(Math.max(BODY_HALF_MM, start.x));
      const neck = { x: shoulder.x, y: PUNCH_HEIGHT_MM - CLAMP.heightMm };
      return [[mirror(neck), mirror(shoulder), mirror(start), TIP, start, shoulder, neck], clamp];
    },
  };
}

/** Swept back behind the bend line between 34 and 70 mm above the tip, so that a flange in front has room to come over. */
const GOOSENECK: Punch = {
  id: 'gooseneck',
  tipAngleDeg: 86,
  isSymmetric: false,
  profile: (tipRadiusMm) => {
    const { start, at } = flank(86, tipRadiusMm);
    const front = mirror(at(Math.max(4, start.x)));
    const nose = [mirror(start), TIP, start, at(12), { x: 34, y: 40 }, { x: 14, y: 34 }, { x: front.x, y: 10 }, front];
    const head = [
      { x: 14, y: 70 },
      { x: 34, y: 70 },
      { x: CLAMP.halfMm, y: PUNCH_HEIGHT_MM - CLAMP.heightMm },
      { x: -CLAMP.halfMm, y: PUNCH_HEIGHT_MM - CLAMP.heightMm },
    ];
    const neck = [
      { x: 14, y: 34 },
      { x: 34, y: 40 },
      { x: 34, y: 70 },
      { x: 14, y: 70 },
    ];
    return [nose, neck, head, clamp];
  },
};

/** Tried in this order; the plainest first. */
export const PUNCHES: readonly Punch[] = [straightPunch('straight', 88), GOOSENECK, straightPunch('acute', 30)];

/** Bends beyond this are first bent so far with the acute punch and then pressed flat on the hemming step, degrees. */
export const STEEPEST_AIR_BEND_DEG = 150;
/** Included angles of the grooves of dies: the usual one, and the one for acute bends, degrees. */
const GROOVES_DEG = [88, 30] as const;
/** Shoulders beside the groove, and the body's height. */
const SHOULDER = { least: commonPractice(4).value, shareOfV: commonPractice(0.2).value } as const;
const DIE_HEIGHT_MM = commonPractice(80).value;
/** Metal left below the groove, mm. */
const BELOW_GROOVE_MM = commonPractice(15).value;

/** The V-die of an opening whose groove is narrow enough for a bend. */
export function dieFor(openingMm: number, bendAngleDeg: number): Die {
  const [usual, acute] = GROOVES_DEG;
  const grooveDeg = 180 - bendAngleDeg >= usual ? usual : acute;
  const halfMouth = openingMm / 2;
  const depthMm = halfMouth / Math.tan(radiansFromDeg(grooveDeg / 2));
  const heightMm = Math.max(DIE_HEIGHT_MM, depthMm + BELOW_GROOVE_MM);
  const halfMm = halfMouth + Math.max(SHOULDER.least, SHOULDER.shareOfV * openingMm);
  const right = [
    { x: 0, y: -heightMm },
    { x: halfMm, y: -heightMm },
    { x: halfMm, y: 0 },
    { x: halfMouth, y: 0 },
    { x: 0, y: -depthMm },
  ];
  return {
    id: `v${String(openingMm)}-${String(grooveDeg)}`,
    openingMm,
    profile: [right, right.map(mirror).reverse()],
  };
}

/** What stands under a die of a height: its holder and the bed. */
export function bedBelow(die: Profile): Profile {
  const footMm = Math.min(...die.flat().map(({ y }) => y));
  const holderFootMm = footMm - HOLDER.heightMm;
  return [
    box(-HOLDER.halfMm, HOLDER.halfMm, holderFootMm, footMm),
    box(-BED.halfMm, BED.halfMm, holderFootMm - BED.reachMm, holderFootMm),
  ];
}

/** The ram above a punch whose tip is at the origin. */
export const RAM_PROFILE: Profile = [box(-RAM.halfMm, RAM.halfMm, PUNCH_HEIGHT_MM, PUNCH_HEIGHT_MM + RAM.reachMm)];

/** Side frames behind the throat, as far up and down as the machine goes. */
export const FRAME_PROFILE: Profile = [box(FRAMES.throatMm, FRAMES.throatMm + 600, -BED.reachMm, RAM.reachMm)];

/** Flat step on which hems are pressed: how far table and bar reach in front of the bend line and behind it, mm. */
const HEMMING_STEP = { frontMm: commonPractice(45).value, behindMm: commonPractice(15).value } as const;
/** The table, its top at 0, and the bed below it. */
export const HEMMING_TABLE: Profile = [box(-HEMMING_STEP.frontMm, HEMMING_STEP.behindMm, -DIE_HEIGHT_MM, 0)];
/** The bar that comes down on it, its underside at 0. */
export const HEMMING_BAR: Profile = [box(-HEMMING_STEP.frontMm, HEMMING_STEP.behindMm, 0, PUNCH_HEIGHT_MM)];

/** The profile turned about, front to back. */
export function turnedAbout(profile: Profile): Profile {
  return profile.map((polygon) => polygon.map(mirror).reverse());
}

/** The profile lifted by a height. */
export function lifted(profile: Profile, byMm: number): Profile {
  return profile.map((polygon) => polygon.map(({ x, y }) => ({ x, y: y + byMm })));
}
