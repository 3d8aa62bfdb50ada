import type { LineSegment, Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { distance, dot, subtract, turnLeft, unit } from '../geometry/vector';
import { signedArea } from '../geometry/loop';
import { type NickMessage, messageOf } from './nick-code';
import { slotsFrom } from './nick-row';

/** What an outline's nicks say; a row that runs the wrong way round belongs to an outline seen in a mirror. */
export type ReadNicks =
  | { readonly kind: 'read'; readonly message: NickMessage; readonly isMirrored: boolean }
  /** There is a row of nicks, and what it says is no message: one of them was lost, added or misread. */
  | { readonly kind: 'damaged' }
  | { readonly kind: 'none' };

/** Pieces of one edge keep to one line this well in a traced outline, mm. */
const ON_LINE_MM = 0.5;
const SAME_WAY_COSINE = 0.95;
/** Shorter pieces say nothing about a direction, mm. */
const SHORTEST_PIECE_MM = 0.6;
/** Widest and narrowest gap that a nick leaves in its edge, mm. */
const GAP_MM = { least: 0.7, most: 8 } as const;
/** A row has at least so many nicks when one was lost. */
const FEWEST_NICKS = 7;

/**
 * Reads revision nicks from an outline, drawn or traced: straight pieces on one line with gaps between them, in which the outline dips
 * into the sheet. Nicks need not be exact arcs.
 */
export function readNicks(outline: Loop): ReadNicks {
  const loop = signedArea(outline) < 0 ? reversed(outline) : outline;
  let isDamaged = false;
  for (const at of rowsIn(loop)) {
    const forward = slotsFrom(at);
    const last = at.at(-1) ?? 0;
    const backward = forward === null ? slotsFrom([...at].reverse().map((place) => last - place)) : null;
    const slots = forward ?? backward;
    const message = slots === null ? null : messageOf(slots);
    if (message !== null) return { kind: 'read', message, isMirrored: forward === null };
    isDamaged = true;
  }
  return { kind: isDamaged ? 'damaged' : 'none' };
}

function reversed(outline: Loop): Loop {
  return [...outline]
    .reverse()
    .map((segment) =>
      segment.kind === 'line'
        ? { ...segment, from: segment.to, to: segment.from }
        : { ...segment, from: segment.to, to: segment.from, clockwise: !segment.clockwise },
    );
}

/** Middles of gaps along every edge that may carry a row, mm from the first. */
function rowsIn(loop: Loop): readonly (readonly number[])[] {
  const pieces = loop.flatMap((segment, index): readonly Piece[] =>
    segment.kind === 'line' && distance(segment.from, segment.to) >= SHORTEST_PIECE_MM ? [{ index, segment }] : [],
  );
  const taken = new Set<number>();
  return pieces.flatMap((piece, first): readonly (readonly number[])[] => {
    if (taken.has(piece.index)) return [];
    const run = runFrom(pieces, first);
    for (const { index } of run) taken.add(index);
    const at = gapsOf(run, loop);
    return at.length >= FEWEST_NICKS ? [at.map((place) => place - (at[0] ?? 0))] : [];
  });
}

interface Piece {
  readonly index: number;
  readonly segment: LineSegment;
}

/**
 * Pieces of one edge, a piece and what carries on its line in both directions: a row may run over the place where the loop is opened.
 * Pieces in between that lie in a dip are passed over.
 */
function runFrom(pieces: readonly Piece[], first: number): readonly Piece[] {
  const run = pieces.slice(first, first + 1);
  const turned = [...pieces.slice(first + 1), ...pieces.slice(0, first)];
  for (const piece of turned) {
    const last = run.at(-1);
    if (last === undefined || distance(piece.segment.from, last.segment.to) > GAP_MM.most) break;
    if (continues(run, piece)) run.push(piece);
  }
  for (const piece of turned.reverse()) {
    const start = run[0];
    if (start === undefined || distance(piece.segment.to, start.segment.from) > GAP_MM.most) break;
    if (!run.includes(piece) && continues([piece], start)) run.unshift(piece);
  }
  return run;
}

/** Whether a piece carries on the line of a run after a gap: the line from the run's start to its end, carried on from there. */
function continues(run: readonly Piece[], { segment }: Piece): boolean {
  const [first, last] = [run[0]?.segment, run.at(-1)?.segment];
  if (first === undefined || last === undefined) return false;
  const way = unit(subtract(last.to, first.from));
  const offMm = (point: Point): number => Math.abs(dot(subtract(point, last.to), turnLeft(way)));
  const gapMm = dot(subtract(segment.from, last.to), way);
  return (
    dot(way, unit(subtract(segment.to, segment.from))) > SAME_WAY_COSINE &&
    offMm(segment.from) <= ON_LINE_MM &&
    gapMm >= GAP_MM.least &&
    gapMm <= GAP_MM.most
  );
}

/** Middles of the gaps in which the outline dips into the sheet, mm along the run. */
function gapsOf(run: readonly Piece[], loop: Loop): readonly number[] {
  const [first, last] = [run[0]?.segment, run.at(-1)?.segment];
  if (first === undefined || last === undefined || run.length < 2) return [];
  const way = unit(subtract(last.to, first.from));
  const inward = turnLeft(way);
  const along = (point: Point): number => dot(subtract(point, first.from), way);
  return run.slice(1).flatMap(({ segment, index }, at): readonly number[] => {
    const before = run[at];
    if (before === undefined) return [];
    const between = betweenOf(loop, before.index, index);
    const depth = Math.max(...between.map((point) => dot(subtract(point, before.segment.to), inward)));
    return depth > 0.2 ? [(along(before.segment.to) + along(segment.from)) / 2] : [];
  });
}

/** Points of the outline between two of its pieces: corners, and the tops of arcs. */
function betweenOf(loop: Loop, from: number, to: number): readonly Point[] {
  const points: Point[] = [];
  for (let index = (from + 1) % loop.length; index !== to; index = (index + 1) % loop.length) {
    const segment = loop[index];
    if (segment === undefined) break;
    points.push(segment.from, segment.to);
    if (segment.kind === 'arc') points.push(topOf(segment));
  }
  return points;
}

/** The middle of a short arc. */
function topOf({ from, to, centre, clockwise }: Extract<Loop[number], { readonly kind: 'arc' }>): Point {
  const radius = distance(from, centre);
  const chord = subtract(to, from);
  if (distance(from, to) === 0) return from;
  const side = turnLeft(unit(chord));
  // A clockwise arc bulges to the left of its chord.
  const sign = clockwise ? 1 : -1;
  return { x: centre.x + sign * side.x * radius, y: centre.y + sign * side.y * radius };
}
