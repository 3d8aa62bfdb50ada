import type { BendZone } from '../bending/development';
import { placeIn } from '../bending/fold';
import type { Pose } from '../bending/fold';
import { flattenLoop } from '../geometry/flatten';
import { CHORD_MM } from '../geometry/tolerance';
import { dot, subtract } from '../geometry/vector';
import { dot3, length3, subtract3 } from '../geometry/vector3';
import { bodiesWhen, posesWhen } from './plates';
import type { Body, Plates, TestBudget } from './plates';
import { prism } from './prism';
import { BRAKE, bendOnDie, pressFlat, reachOf } from './stroke';
import type { Blank, Hindrance, Obstacle, Tool } from './stroke';
import {
  FRAMES,
  FRAME_PROFILE,
  HEMMING_BAR,
  HEMMING_TABLE,
  RAM_PROFILE,
  STEEPEST_AIR_BEND_DEG,
  TIP_RADIUS_MM,
  bedBelow,
  dieFor,
  turnedAbout,
} from './tooling';
import type { Die, Profile, Punch, PunchId } from './tooling';

export type { Hindrance } from './stroke';

/** Punches at hand, in the order in which they are tried. */
export interface Tooling {
  readonly punches: readonly Punch[];
}

/** One bend of an order. */
export interface BendStep {
  readonly bendId: string;
  readonly punchId: PunchId;
  readonly dieId: string;
  /** Face B up. */
  readonly isTurnedOver: boolean;
  /** Which side of the bend lies behind, against the back gauge: the one nearer to the base panel, or the other. */
  readonly gaugedSide: 'parent' | 'child';
  /** It is bent to 150 degrees first and then pressed flat on the hemming step. */
  readonly isPressedFlat: boolean;
}

export type MadeBend = { readonly step: BendStep } | { readonly hindrance: Hindrance };

/** Longer than any sheet, mm. */
const ENDLESS_MM = 100_000;

/**
 * Tries to make one bend on a part whose bends `made` are made.
 * @param zones all stretches of the bend
 * @param against `ownPanels`: only the two panels beside the bend count, which is what no order can change
 */
export function makeBend(
  plates: Plates,
  zones: readonly BendZone[],
  made: ReadonlySet<string>,
  { punches }: Tooling,
  against: 'wholePart' | 'ownPanels',
  budget: TestBudget,
): MadeBend {
  const [zone] = zones;
  if (zone === undefined) throw new RangeError('A bend has at least one stretch.');
  const { stock, bendTable } = plates.development;
  const row = bendTable.find(({ bendId }) => bendId === zone.bendId);
  const openingMm = row?.vOpeningMm ?? stock.vOpeningMm;
  const airDeg = Math.min(zone.bendAngleDeg, STEEPEST_AIR_BEND_DEG);
  const die = dieFor(openingMm, airDeg);
  const isMade = ({ bendId }: BendZone): boolean => made.has(bendId);

  for (const one of zones) {
    const slip = slips(plates, one, openingMm, isMade);
    if (slip !== null) return { hindrance: slip };
  }
  const poses = posesWhen(plates, isMade);
  if (!zones.every((other) => isInLine(zone, poses[zone.parentIndex], other, poses[other.parentIndex])))
    return { hindrance: { kind: 'outOfLine' } };

  const blank = cutAt(plates, zones, poses, isMade, against);
  const reaches = zones.map((one) => reachAlong(zone, one));
  const pressed =
    zone.bendAngleDeg > airDeg ? pressFlat(blank, airDeg, zone.bendAngleDeg, hemmingTools(reaches), budget) : null;
  if (pressed !== null) return { hindrance: pressed };

  let best: Hindrance | null = null;
  for (const punch of punches) {
    if (punch.tipAngleDeg > 180 - airDeg && punches.some(({ tipAngleDeg }) => tipAngleDeg <= 180 - airDeg)) continue;
    for (const gaugedSide of ['child', 'parent'] as const) {
      const tipMm = Math.min(TIP_RADIUS_MM, zone.insideRadiusMm);
      const tools = toolsFor(punch.profile(tipMm), die, reaches, gaugedSide === 'parent');
      const hindrance = bendOnDie(blank, openingMm, airDeg, tools, budget);
      if (hindrance === null) {
        const isTurnedOver = zone.direction === 'away';
        const isPressedFlat = zone.bendAngleDeg > airDeg;
        return {
          step: { bendId: zone.bendId, punchId: punch.id, dieId: die.id, isTurnedOver, gaugedSide, isPressedFlat },
        };
      }
      if (best === null || farther(hindrance, best)) best = hindrance;
      if (punch.isSymmetric && !(hindrance.kind === 'hits' && hindrance.obstacle === 'frames')) break;
    }
  }
  return { hindrance: best ?? { kind: 'noPunch' } };
}

function farther(a: Hindrance, b: Hindrance): boolean {
  return a.kind === 'hits' && b.kind === 'hits' && a.atAngleDeg > b.atAngleDeg;
}

/** Half the mouth from the middle of the bend, on both sides, while the sheet is flat. */
function slips(
  plates: Plates,
  zone: BendZone,
  openingMm: number,
  isMade: (zone: BendZone) => boolean,
): Hindrance | null {
  const requiredMm = openingMm / 2;
  for (const side of ['child', 'parent'] as const) {
    const reachMm = zone.bendAllowanceMm / 2 + reachOf(plates.development, zone, side, isMade);
    if (reachMm < requiredMm - SLACK_MM) return { kind: 'slips', side, reachMm, requiredMm };
  }
  return null;
}

/** A reach set to the limit passes whatever rounding did to it, mm. */
const SLACK_MM = 1e-6;
/** Stretches of a bend that lie within this of one line are bent in one stroke, mm. */
const IN_LINE_MM = 0.05;

/** Whether earlier bends have left a second stretch of the bend where the flat pattern has it beside the first. */
function isInLine(zone: BendZone, pose: Pose | undefined, other: BendZone, otherPose: Pose | undefined): boolean {
  if (other === zone || pose === undefined || otherPose === undefined) return true;
  const isFar = length3(subtract3(placeIn(otherPose, other.origin, 0).at, placeIn(pose, other.origin, 0).at));
  return isFar <= IN_LINE_MM && dot3(pose.uz, otherPose.uz) > PARALLEL_COSINE;
}

const PARALLEL_COSINE = 0.9999;

/** How far a stretch of the bend reaches along it, from the first stretch's origin, mm. */
function reachAlong(first: BendZone, zone: BendZone): readonly [number, number] {
  const alongs = flattenLoop(zone.outer, CHORD_MM).map((point) => dot(subtract(point, first.origin), first.along));
  return [Math.min(...alongs), Math.max(...alongs)];
}

/** The part in two halves at the bend, in the axes of the base panel; the bend itself belongs to neither. */
function cutAt(
  plates: Plates,
  zones: readonly BendZone[],
  poses: readonly Pose[],
  isMade: (zone: BendZone) => boolean,
  against: 'wholePart' | 'ownPanels',
): Blank {
  const { panels, zones: allZones } = plates.development;
  const isBehind: boolean[] = [];
  for (const { index, parentIndex } of panels) {
    const isHinge = zones.some(({ childIndex }) => childIndex === index);
    isBehind[index] = isHinge || (parentIndex !== null && isBehind[parentIndex] === true);
  }
  const own = new Set(zones.flatMap(({ parentIndex, childIndex }) => [parentIndex, childIndex]));
  const sideOf = ({ of }: Body): boolean => {
    const panel = of.kind === 'panel' ? of.index : (allZones[of.index]?.parentIndex ?? 0);
    return isBehind[panel] === true;
  };
  const bodies = bodiesWhen(plates, poses, isMade).filter(({ of }) => {
    if (against === 'ownPanels') return of.kind === 'panel' && own.has(of.index);
    return of.kind === 'panel' || !zones.some((zone) => zone === allZones[of.index]);
  });
  const [zone] = zones;
  if (zone === undefined) throw new RangeError('A bend has at least one stretch.');
  return {
    plates,
    zone,
    poses,
    parentHalf: bodies.filter((body) => !sideOf(body)),
    childHalf: bodies.filter(sideOf),
  };
}

type Reach = readonly [number, number];

function toolsOf(obstacle: Obstacle, isMoving: boolean, profile: Profile, reaches: readonly Reach[]): readonly Tool[] {
  return profile.flatMap((polygon) =>
    reaches.map(([from, to]) => ({ obstacle, isMoving, shape: prism(BRAKE, polygon, from, to) })),
  );
}

const EVERYWHERE: readonly Reach[] = [[-ENDLESS_MM, ENDLESS_MM]];

/** Punch and die along the bend; ram, bed and frames; the part lies the way round in which `isMirrored` says the child is in front. */
function toolsFor(punch: Profile, die: Die, reaches: readonly Reach[], isMirrored: boolean): readonly Tool[] {
  const [first, last] = [Math.min(...reaches.map(([from]) => from)), Math.max(...reaches.map(([, to]) => to))];
  const middle = (first + last) / 2;
  const beside: readonly Reach[] = [
    [-ENDLESS_MM, middle - FRAMES.betweenMm / 2],
    [middle + FRAMES.betweenMm / 2, ENDLESS_MM],
  ];
  const lying = (profile: Profile): Profile => (isMirrored ? turnedAbout(profile) : profile);
  return [
    ...toolsOf('punch', true, lying(punch), reaches),
    ...toolsOf('die', false, die.profile, reaches),
    ...toolsOf('ram', true, RAM_PROFILE, EVERYWHERE),
    ...toolsOf('bed', false, bedBelow(die.profile), EVERYWHERE),
    ...toolsOf('frames', false, lying(FRAME_PROFILE), beside),
  ];
}

function hemmingTools(reaches: readonly Reach[]): readonly Tool[] {
  return [
    ...toolsOf('punch', true, HEMMING_BAR, reaches),
    ...toolsOf('die', false, HEMMING_TABLE, reaches),
    ...toolsOf('ram', true, RAM_PROFILE, EVERYWHERE),
    ...toolsOf('bed', false, bedBelow(HEMMING_TABLE), EVERYWHERE),
  ];
}
