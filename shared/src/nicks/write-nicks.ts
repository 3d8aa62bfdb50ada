import { loopClearance } from '../geometry/clearance';
import type { LineSegment, Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line, segmentLength } from '../geometry/segment';
import { along, subtract, turnLeft, unit } from '../geometry/vector';
import { type NickMessage, slotsOf } from './nick-code';
import { ROW_STEPS, placesOf } from './nick-row';

/** A flat pattern as far as nicks need it. Loops in mm, the outline counter-clockwise. */
export interface NickSheet {
  readonly outer: Loop;
  readonly openings: readonly Loop[];
  /** Bend zones, and places that bear or seal: nicks keep away from them. */
  readonly keepClear: readonly Loop[];
  readonly thicknessMm: number;
}

export interface NickedOutline {
  readonly outer: Loop;
  /** Middles of the nicks on the edge, in the order of the row. */
  readonly at: readonly Point[];
  readonly radiusMm: number;
  readonly pitchMm: number;
}

/** Why an outline can't carry nicks. */
export class NickError extends RangeError {}

/** Radius of a nick by thickness: a laser cuts an opening of one thickness well, and so a nick as wide. Common practice, no source. */
export function nickRadiusMm(thicknessMm: number): number {
  return Math.max(0.75, thicknessMm / 2);
}

/** From nick to nick: a nick and a land of one thickness, at least 1 mm. Common practice, no source. */
export function nickPitchMm(thicknessMm: number): number {
  return 2 * nickRadiusMm(thicknessMm) + Math.max(1, thicknessMm);
}

/** Shortest straight edge that carries a row, mm: the row, and two thicknesses (at least 2 mm) free at either end. */
export function shortestNickEdgeMm(thicknessMm: number): number {
  return ROW_STEPS * nickPitchMm(thicknessMm) + 2 * nickRadiusMm(thicknessMm) + 2 * endMm(thicknessMm);
}

const endMm = (thicknessMm: number): number => Math.max(2, 2 * thicknessMm);
/** Nicks keep this many thicknesses from bend zones, openings and other edges: 2 T, as openings do from a bend. */
const CLEAR_OVER_T = 2;

/**
 * Cuts a message into an outline as a row of round nicks on the straight edge that lies farthest from everything else.
 * @throws NickError when the letter is beyond the code, or no edge is long and free enough
 */
export function writeNicks(sheet: NickSheet, message: NickMessage): NickedOutline {
  const slots = slotsOf(message);
  if (slots === null) throw new NickError(`Nicks have no sign for revision ${message.letter}.`);
  const best = freestPlace(sheet);
  if (best === null) {
    const needMm = shortestNickEdgeMm(sheet.thicknessMm).toFixed(0);
    throw new NickError(`No straight edge has ${needMm} mm free of bends, openings and corners for the nicks.`);
  }
  const radiusMm = nickRadiusMm(sheet.thicknessMm);
  const pitchMm = nickPitchMm(sheet.thicknessMm);
  const way = unit(subtract(best.edge.to, best.edge.from));
  const at = placesOf(slots).map((step) => along(best.start, way, step * pitchMm));
  const nicked: Segment[] = [];
  let from = best.edge.from;
  for (const centre of at) {
    const [start, end] = [along(centre, way, -radiusMm), along(centre, way, radiusMm)];
    nicked.push(line(from, start), { kind: 'arc', from: start, to: end, centre, clockwise: true });
    from = end;
  }
  nicked.push(line(from, best.edge.to));
  const outer = sheet.outer.flatMap((segment, index) => (index === best.index ? nicked : [segment]));
  return { outer, at, radiusMm, pitchMm };
}

interface NickPlace {
  readonly index: number;
  readonly edge: LineSegment;
  /** Middle of the first nick. */
  readonly start: Point;
  readonly freeMm: number;
}

/** The place with the most room round it, trying every straight edge at its middle and towards both ends. */
function freestPlace(sheet: NickSheet): NickPlace | null {
  const { outer, openings, keepClear, thicknessMm } = sheet;
  const radiusMm = nickRadiusMm(thicknessMm);
  const rowMm = ROW_STEPS * nickPitchMm(thicknessMm);
  let best: NickPlace | null = null;
  outer.forEach((edge, index) => {
    const spareMm = segmentLength(edge) - shortestNickEdgeMm(thicknessMm);
    if (edge.kind !== 'line' || spareMm < 0) return;
    const way = unit(subtract(edge.to, edge.from));
    const others = [...openings, ...keepClear, ...rest(outer, index)];
    for (const share of [0.5, 0.25, 0.75, 0, 1]) {
      const start = along(edge.from, way, endMm(thicknessMm) + radiusMm + share * spareMm);
      const strip = stripOf(start, way, rowMm, radiusMm);
      const freeMm = Math.min(...others.map((loop) => loopClearance(strip, loop)?.distanceMm ?? Infinity));
      if (freeMm < CLEAR_OVER_T * thicknessMm) continue;
      if (best === null || freeMm > best.freeMm + 1e-6) best = { index, edge, start, freeMm };
    }
  });
  return best;
}

/** The other edges of the outline but for the neighbours of one, as chains of one edge each. */
function rest(outer: Loop, index: number): readonly Loop[] {
  const count = outer.length;
  return outer
    .filter((_, at) => at !== index && at !== (index + 1) % count && at !== (index + count - 1) % count)
    .map((segment) => [segment]);
}

/** The rectangle that a row of nicks takes out of the sheet, at most. */
function stripOf(start: Point, way: Point, rowMm: number, radiusMm: number): Loop {
  const inward = turnLeft(way);
  const a = along(start, way, -radiusMm);
  const b = along(start, way, rowMm + radiusMm);
  const c = along(b, inward, radiusMm);
  const d = along(a, inward, radiusMm);
  return [line(a, b), line(b, c), line(c, d), line(d, a)];
}
