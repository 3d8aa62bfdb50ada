import type { BendZone, Development } from '../bending/development';
import { direction3, placeIn } from '../bending/fold';
import type { Pose } from '../bending/fold';
import { loopReach } from '../geometry/loop';
import type { Point, Point3 } from '../geometry/point';
import { along, dot, scale } from '../geometry/vector';
import { along3, dot3, subtract3 } from '../geometry/vector3';
import { radiansFromDeg } from '../units/angle';
import { areJoined, bodiesOverlap, meetsTool, moved } from './plates';
import type { Body, PieceName, Plates, TestBudget } from './plates';
import type { Prism } from './prism';
import { posed } from './prism';

/** What a piece of the part runs into while a bend is made. */
export type Obstacle = 'punch' | 'die' | 'ram' | 'bed' | 'frames' | 'part';

/** Why a bend cannot be made in a state of the part. */
export type Hindrance =
  | {
      readonly kind: 'hits';
      readonly obstacle: Obstacle;
      readonly piece: PieceName;
      /** The other piece when the part runs into itself, else null. */
      readonly other: PieceName | null;
      /** How far the bend had come, degrees. */
      readonly atAngleDeg: number;
    }
  /** One side does not reach over half the die's mouth, so that the sheet slips into the groove. */
  | { readonly kind: 'slips'; readonly side: 'parent' | 'child'; readonly reachMm: number; readonly requiredMm: number }
  /** Stretches of one bend that earlier bends have brought out of line. */
  | { readonly kind: 'outOfLine' }
  /** There is no punch at all. */
  | { readonly kind: 'noPunch' };

/** A tool or beam of the machine in the brake's axes: x across, y up, z along the bend from its origin. */
export interface Tool {
  readonly obstacle: Obstacle;
  readonly shape: Prism;
  /** It comes down with the ram. */
  readonly isMoving: boolean;
}

/** Part with the bends made so far, cut in two at the bend that is to be made. */
export interface Blank {
  readonly plates: Plates;
  readonly zone: BendZone;
  readonly poses: readonly Pose[];
  readonly parentHalf: readonly Body[];
  readonly childHalf: readonly Body[];
}

/** Between one look at the stroke and the next the bend turns by no more than this. */
const LOOK_EVERY_DEG = 15;

/** The brake's own axes. */
export const BRAKE: Pose = {
  origin: { x: 0, y: 0, z: 0 },
  ux: { x: 1, y: 0, z: 0 },
  uy: { x: 0, y: 1, z: 0 },
  uz: { x: 0, y: 0, z: 1 },
};

/** Radius of the outer face while a bend turns: the neutral line keeps its length, as in `bending/fold.ts`. */
function outsideRadiusMm(zone: BendZone, thicknessMm: number, turnedRad: number): number {
  return zone.bendAllowanceMm / turnedRad + (1 - zone.kFactor) * thicknessMm;
}

/** Where one side of the sheet is in the brake: its outer face's tangent point, and how steeply it rises to the back. */
interface Seat {
  readonly at: Point;
  readonly riseRad: number;
}

interface Moment {
  readonly angleDeg: number;
  readonly parent: Seat;
  readonly child: Seat;
  /** Height of what moves with the ram. */
  readonly rammedMm: number;
}

/**
 * The sheet on a V: both sides rise alike, their outer faces on the die's shoulders. A bend whose outside radius is wider than
 * the mouth rests on its arc.
 */
export function onDie(zone: BendZone, thicknessMm: number, openingMm: number, angleDeg: number): Moment {
  const half = radiansFromDeg(angleDeg) / 2;
  if (half === 0) {
    const at = { x: zone.bendAllowanceMm / 2, y: 0 };
    return {
      angleDeg,
      parent: { at: { x: -at.x, y: 0 }, riseRad: 0 },
      child: { at, riseRad: 0 },
      rammedMm: thicknessMm,
    };
  }
  const outside = outsideRadiusMm(zone, thicknessMm, 2 * half);
  const x = outside * Math.sin(half);
  const y =
    x <= openingMm / 2
      ? (x - openingMm / 2) * Math.tan(half)
      : Math.sqrt(outside * outside - (openingMm * openingMm) / 4) - outside * Math.cos(half);
  const rammedMm = y - 2 * outside * Math.sin(half / 2) ** 2 + thicknessMm;
  return { angleDeg, parent: { at: { x: -x, y }, riseRad: -half }, child: { at: { x, y }, riseRad: half }, rammedMm };
}

/** The parent flat on the table, the child coming down over it; the bar rests on the child's highest point. */
function onTable(blank: Blank, thicknessMm: number, angleDeg: number): Moment {
  const turned = radiansFromDeg(angleDeg);
  const outside = outsideRadiusMm(blank.zone, thicknessMm, turned);
  const at = { x: outside * Math.sin(turned), y: outside * (1 - Math.cos(turned)) };
  const reachMm = reachOf(blank.plates.development, blank.zone, 'child', () => true);
  const rammedMm = Math.max(at.y, at.y + reachMm * Math.sin(turned));
  return { angleDeg, parent: { at: { x: 0, y: 0 }, riseRad: 0 }, child: { at, riseRad: turned }, rammedMm };
}

/** Angles at which a stroke is looked at, its start and its end among them. */
function looks(fromDeg: number, toDeg: number): readonly number[] {
  const count = Math.max(1, Math.ceil((toDeg - fromDeg) / LOOK_EVERY_DEG));
  return Array.from({ length: count + 1 }, (_, look) => fromDeg + ((toDeg - fromDeg) * look) / count);
}

/** Bends over a V up to an angle. @returns the first thing in the way, or null */
export function bendOnDie(
  blank: Blank,
  openingMm: number,
  toDeg: number,
  tools: readonly Tool[],
  budget: TestBudget,
): Hindrance | null {
  const { thicknessMm } = blank.plates.development.stock;
  return firstHit(
    blank,
    looks(0, toDeg).map((angleDeg) => onDie(blank.zone, thicknessMm, openingMm, angleDeg)),
    tools,
    budget,
  );
}

/** Presses an acute bend flat on the hemming step. */
export function pressFlat(
  blank: Blank,
  fromDeg: number,
  toDeg: number,
  tools: readonly Tool[],
  budget: TestBudget,
): Hindrance | null {
  const { thicknessMm } = blank.plates.development.stock;
  return firstHit(
    blank,
    looks(fromDeg, toDeg).map((angleDeg) => onTable(blank, thicknessMm, angleDeg)),
    tools,
    budget,
  );
}

function firstHit(
  blank: Blank,
  moments: readonly Moment[],
  tools: readonly Tool[],
  budget: TestBudget,
): Hindrance | null {
  for (const moment of moments) {
    if (budget.left < 0) return null;
    const parent = seated(blank, 'parent', moment.parent);
    const child = seated(blank, 'child', moment.child);
    const ram: Pose = { ...BRAKE, origin: { x: 0, y: moment.rammedMm, z: 0 } };
    for (const { obstacle, shape, isMoving } of tools) {
      const tool = isMoving ? posed(shape, ram) : shape;
      for (const half of [parent, child]) {
        const hit = half.find((body) => meetsTool(body, tool, budget));
        if (hit !== undefined)
          return { kind: 'hits', obstacle, piece: hit.of, other: null, atAngleDeg: moment.angleDeg };
      }
    }
    // Flat, the part is as the bend before left it.
    if (moment.angleDeg === 0) continue;
    for (const first of parent) {
      const other = child.find(
        (second) => !areJoined(blank.plates.development, first, second) && bodiesOverlap(first, second, budget),
      );
      if (other !== undefined)
        return { kind: 'hits', obstacle: 'part', piece: first.of, other: other.of, atAngleDeg: moment.angleDeg };
    }
  }
  return null;
}

/** One half of the part in the brake's axes. */
function seated({ plates, zone, poses, parentHalf, childHalf }: Blank, side: 'parent' | 'child', seat: Seat) {
  const panel = poses[side === 'parent' ? zone.parentIndex : zone.childIndex];
  if (panel === undefined) return [];
  const isTowards = zone.direction === 'towards';
  const start = side === 'parent' ? zone.origin : along(zone.origin, zone.towardsChild, zone.bendAllowanceMm);
  const tangent = placeIn(panel, start, isTowards ? 0 : plates.development.stock.thicknessMm).at;
  const back = direction3(panel, zone.towardsChild);
  const up = isTowards ? panel.uz : opposite(panel.uz);
  const [cosine, sine] = [Math.cos(seat.riseRad), Math.sin(seat.riseRad)];
  const across = along3(times(back, cosine), up, -sine);
  const upright = along3(times(back, sine), up, cosine);
  const alongBend = direction3(panel, zone.along);
  const origin = along3(along3(tangent, across, -seat.at.x), upright, -seat.at.y);
  const turned = (vector: Point3): Point3 => ({
    x: dot3(across, vector),
    y: dot3(upright, vector),
    z: dot3(alongBend, vector),
  });
  return (side === 'parent' ? parentHalf : childHalf).map((body) => {
    const { pose } = body.around;
    return moved(body, {
      origin: turned(subtract3(pose.origin, origin)),
      ux: turned(pose.ux),
      uy: turned(pose.uy),
      uz: turned(pose.uz),
    });
  });
}

function times(a: Point3, factor: number): Point3 {
  return { x: a.x * factor, y: a.y * factor, z: a.z * factor };
}

function opposite(a: Point3): Point3 {
  return times(a, -1);
}

/**
 * How far flat sheet reaches from a bend's tangent line on one side, mm: its panel, and panels behind it over bends that are
 * not made yet.
 */
export function reachOf(
  { panels, zones }: Development,
  zone: BendZone,
  side: 'parent' | 'child',
  isBent: (other: BendZone) => boolean,
): number {
  const outward = side === 'child' ? zone.towardsChild : scale(zone.towardsChild, -1);
  const tangent = side === 'child' ? along(zone.origin, zone.towardsChild, zone.bendAllowanceMm) : zone.origin;
  const flat = [side === 'child' ? zone.childIndex : zone.parentIndex];
  for (const index of flat) {
    for (const other of zones) {
      if (other.bendId === zone.bendId || isBent(other)) continue;
      const next =
        other.parentIndex === index ? other.childIndex : other.childIndex === index ? other.parentIndex : null;
      if (next !== null && !flat.includes(next)) flat.push(next);
    }
  }
  const reaches = flat.flatMap((index) => {
    const panel = panels[index];
    return panel === undefined ? [] : [loopReach(panel.outer, outward)];
  });
  return Math.max(...reaches) - dot(tangent, outward);
}
