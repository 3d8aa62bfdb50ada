import { edgeCrossings } from '../geometry/clip';
import { intersectSegments } from '../geometry/intersect';
import { isInRegion, pointInLoop } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line, nearestOnSegment } from '../geometry/segment';
import { COINCIDENT_MM, JOIN_MM } from '../geometry/tolerance';
import { along, coincide, distance, dot, subtract, turnLeft, unit } from '../geometry/vector';
import type { DevelopmentProblem } from './development';
import type { BendDeclaration } from './layout';
import type { Sheet } from './sheet';

/** One stretch of a bend line across the sheet, from boundary to boundary. */
export interface Chord {
  readonly from: Point;
  readonly to: Point;
}

/** A bend line with the stretches of sheet it crosses. `direction` runs from the line's `from` to its `to`. */
export interface Crease {
  readonly bend: BendDeclaration;
  readonly name: string;
  readonly origin: Point;
  readonly direction: Point;
  readonly chords: readonly Chord[];
}

export type CreaseResult =
  | { readonly ok: true; readonly creases: readonly Crease[] }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/**
 * Clips every bend line to the sheet. A line has to cross the sheet from boundary to boundary; ends that miss a boundary by no
 * more than `JOIN_MM` are taken to reach it. Openings may interrupt it.
 */
export function readCreases(bends: readonly BendDeclaration[], sheet: Sheet): CreaseResult {
  const problems: DevelopmentProblem[] = [];
  const creases: Crease[] = [];
  const boundaries = [sheet.outer, ...sheet.cutouts.map(({ loop }) => loop)];
  bends.forEach((bend, index) => {
    const name = `B${String(index + 1)}`;
    const { from, to } = bend.line;
    const isUsable = [from.x, from.y, to.x, to.y].every(Number.isFinite) && distance(from, to) > COINCIDENT_MM;
    if (!isUsable) {
      problems.push({ code: 'bendLineOutside', message: `Bend line ${name} has no length.`, ids: [bend.id] });
      return;
    }
    const direction = unit(subtract(to, from));
    const found = chordsOf(from, direction, distance(from, to), boundaries);
    if (found.loose !== null) {
      const where = `${found.loose.x.toFixed(2)}, ${found.loose.y.toFixed(2)} mm`;
      const message = `Bend line ${name} ends inside the sheet at ${where}. Take it to an edge, or cut a relief there.`;
      problems.push({ code: 'bendLineEndsInside', message, ids: [bend.id] });
    } else if (found.chords.length === 0) {
      problems.push({
        code: 'bendLineOutside',
        message: `Bend line ${name} does not cross the sheet.`,
        ids: [bend.id],
      });
    } else {
      creases.push({ bend, name, origin: from, direction, chords: found.chords });
    }
  });
  problems.push(...crossingCreases(creases));
  return problems.length > 0 ? { ok: false, problems } : { ok: true, creases };
}

/** Stretches of the line inside the sheet that the drawn stretch covers; `loose` is an end left inside the sheet. */
function chordsOf(
  origin: Point,
  direction: Point,
  lengthMm: number,
  boundaries: readonly Loop[],
): { readonly chords: readonly Chord[]; readonly loose: Point | null } {
  const [outer, ...openings] = boundaries;
  if (outer === undefined) return { chords: [], loose: null };
  const half = { origin, inward: turnLeft(direction) };
  const crossings: Point[] = [];
  for (const loop of boundaries) {
    for (const segment of loop) {
      for (const point of edgeCrossings(segment, half, COINCIDENT_MM)) {
        if (nearestOnSegment(segment, point).distanceMm <= COINCIDENT_MM) crossings.push(point);
      }
    }
  }
  const hits = crossings
    .map((point) => ({ point, at: dot(subtract(point, origin), direction) }))
    .sort((a, b) => a.at - b.at);
  const chords: Chord[] = [];
  for (let index = 1; index < hits.length; index += 1) {
    const start = hits[index - 1];
    const end = hits[index];
    if (start === undefined || end === undefined || end.at - start.at <= COINCIDENT_MM) continue;
    const middle = along(origin, direction, (start.at + end.at) / 2);
    const isSheet = isInRegion(middle, outer, openings, 0) && !isOnBoundary(middle, boundaries);
    if (!isSheet) continue;
    const covered = Math.min(end.at, lengthMm) - Math.max(start.at, 0);
    if (covered <= Math.min(JOIN_MM, (end.at - start.at) / 2)) continue;
    const from = start.at >= -JOIN_MM ? start.point : reachBoundary(origin, boundaries);
    const drawnEnd = along(origin, direction, lengthMm);
    const to = end.at <= lengthMm + JOIN_MM ? end.point : reachBoundary(drawnEnd, boundaries);
    if (from === null) return { chords: [], loose: origin };
    if (to === null) return { chords: [], loose: drawnEnd };
    chords.push({ from, to });
  }
  return { chords, loose: null };
}

function isOnBoundary(point: Point, boundaries: readonly Loop[]): boolean {
  return boundaries.some((loop) => pointInLoop(point, loop, COINCIDENT_MM) === 'on');
}

/** The corner or nearest point of a boundary that an end of a bend line was meant to reach, or null when none is near. */
function reachBoundary(end: Point, boundaries: readonly Loop[]): Point | null {
  let best: { readonly point: Point; readonly distanceMm: number } | null = null;
  for (const segment of boundaries.flat()) {
    const corner = { point: segment.from, distanceMm: distance(segment.from, end) };
    const near = nearestOnSegment(segment, end);
    // A corner within reach is what was meant, even where the middle of an edge is a little nearer.
    const candidate = corner.distanceMm <= JOIN_MM ? { ...corner, distanceMm: corner.distanceMm / 4 } : near;
    if (candidate.distanceMm <= JOIN_MM && (best === null || candidate.distanceMm < best.distanceMm)) best = candidate;
  }
  return best === null ? null : best.point;
}

/** Bend lines may share an end at a corner of the sheet and nothing else. */
function crossingCreases(creases: readonly Crease[]): readonly DevelopmentProblem[] {
  const problems: DevelopmentProblem[] = [];
  creases.forEach((first, index) => {
    for (const second of creases.slice(index + 1)) {
      const isCrossing = first.chords.some((a) => second.chords.some((b) => chordsMeet(a, b)));
      if (!isCrossing) continue;
      const message = `Bend lines ${first.name} and ${second.name} cross inside the sheet.`;
      problems.push({ code: 'bendLinesCross', message, ids: [first.bend.id, second.bend.id] });
    }
  });
  return problems;
}

function chordsMeet(a: Chord, b: Chord): boolean {
  const met = intersectSegments(line(a.from, a.to), line(b.from, b.to), COINCIDENT_MM);
  if (met.kind === 'none') return false;
  if (met.kind === 'overlap') return true;
  const isEnd = (point: Point, chord: Chord): boolean =>
    coincide(point, chord.from, 4 * COINCIDENT_MM) || coincide(point, chord.to, 4 * COINCIDENT_MM);
  return met.points.some((point) => !isEnd(point, a) || !isEnd(point, b));
}
