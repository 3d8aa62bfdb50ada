import { sealed } from '../geometry/chain';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line, reverseSegment } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { along, cross, distance, dot, scale, subtract, turnLeft } from '../geometry/vector';
import type { Crease } from './crease';
import { isBefore, mirroredPlace, runBetween, walkEdge } from './edge-walk';
import type { EdgeWalk, EndFrame, RunPlace } from './edge-walk';
import type { ReliefSettings } from './layout';
import { isChordEdge } from './panels';
import type { ChordEdge, Face } from './panels';
import { cutRelief, reliefSize } from './relief';

/** How a panel's tangent edge ends: at a side edge of the panel, beside sheet that goes on, or at another bend's tangent line. */
export interface TrimEnd {
  readonly kind: 'side' | 'shoulder' | 'corner';
  /** End of the tangent edge, layout coordinates. */
  readonly point: Point;
  /** Direction in which the boundary leaves the bend there; null where the end is not on a side edge. */
  readonly tangent: Point | null;
}

/** Ends of one tangent edge of a face, in the direction of the bend line. */
export interface TrimmedChord {
  readonly crease: number;
  readonly chord: number;
  readonly start: TrimEnd;
  readonly end: TrimEnd;
}

/** A bend end with sheet beside it. */
export interface ShoulderEnd {
  readonly crease: number;
  readonly corner: Point;
  readonly tangentPoint: Point;
  readonly isRelieved: boolean;
  readonly widthMm: number;
  readonly depthMm: number;
}

/** A face cut back to its tangent lines, layout coordinates, counter-clockwise. */
export interface TrimmedFace {
  readonly outer: Loop;
  readonly chords: readonly TrimmedChord[];
  readonly shoulders: readonly ShoulderEnd[];
}

export type TrimResult =
  { readonly ok: true; readonly face: TrimmedFace } | { readonly ok: false; readonly creases: readonly number[] };

/** What cutting back needs to know of the bends. */
export interface TrimRules {
  readonly creases: readonly Crease[];
  /** Distance from each bend line to its tangent lines, mm; negative when the panel has to reach beyond its bend line. */
  readonly setbacksMm: readonly number[];
  readonly radiiMm: readonly number[];
  readonly thicknessMm: number;
  readonly reliefs: ReliefSettings;
}

interface OpenEnd {
  readonly edge: ChordEdge;
  readonly frame: EndFrame;
  readonly setbackMm: number;
  readonly walk: EdgeWalk;
}

/** Smallest sine at which two tangent lines still meet in a corner and do not run along each other. */
const CORNER_SINE = 0.05;

/**
 * Cuts a face back from its bend lines to the tangent lines, following its side edges and cutting reliefs beside bends that are
 * narrower than the face. Fails, naming the bends, when there is no flat left between two of them.
 */
export function trimFace(face: Face, rules: TrimRules): TrimResult {
  const first = face.outer.findIndex(isChordEdge);
  if (first === -1) return { ok: true, face: { outer: face.outer, chords: [], shoulders: [] } };
  const edges = [...face.outer.slice(first), ...face.outer.slice(0, first)];
  const chords: ChordEdge[] = [];
  const runs: Segment[][] = [];
  for (const edge of edges) {
    if (isChordEdge(edge)) {
      chords.push(edge);
      runs.push([]);
    } else runs.at(-1)?.push(edge);
  }
  const shoulders: ShoulderEnd[] = [];
  const joints: RunTrim[] = [];
  for (let index = 0; index < chords.length; index += 1) {
    const from = chords[index];
    const to = chords[(index + 1) % chords.length];
    if (from === undefined || to === undefined) continue;
    const joint = trimRun(runs[index] ?? [], from, to, rules, shoulders);
    if (joint === null) return { ok: false, creases: [...new Set([from.crease, to.crease])] };
    joints.push(joint);
  }
  const outer: Segment[] = [];
  const trimmed: TrimmedChord[] = [];
  chords.forEach((chord, index) => {
    const before = joints[(index + joints.length - 1) % joints.length];
    const after = joints[index];
    if (before === undefined || after === undefined) return;
    const [begin, finish] = [before.into, after.outOf];
    trimmed.push({
      crease: chord.crease,
      chord: chord.chord,
      start: chord.isForward ? begin : finish,
      end: chord.isForward ? finish : begin,
    });
    outer.push(line(begin.point, finish.point), ...after.path);
  });
  const backwards = chords.find((chord, index) => {
    const edge = line(
      joints[(index + joints.length - 1) % joints.length]?.into.point ?? chord.from,
      joints[index]?.outOf.point ?? chord.to,
    );
    return dot(subtract(edge.to, edge.from), subtract(chord.to, chord.from)) <= 0;
  });
  if (backwards !== undefined) return { ok: false, creases: [backwards.crease] };
  const kept = outer.filter((segment) => distance(segment.from, segment.to) > COINCIDENT_MM);
  return { ok: true, face: { outer: sealed(kept), chords: trimmed, shoulders } };
}

interface RunTrim {
  /** End of the tangent edge the run leaves. */
  readonly outOf: TrimEnd;
  /** Start of the tangent edge the run leads to. */
  readonly into: TrimEnd;
  readonly path: readonly Segment[];
}

function trimRun(
  run: readonly Segment[],
  from: ChordEdge,
  to: ChordEdge,
  rules: TrimRules,
  shoulders: ShoulderEnd[],
): RunTrim | null {
  const back = [...run].reverse().map(reverseSegment);
  const leaving = openEnd(from, 'to', run, rules);
  const entering = openEnd(to, 'from', back, rules);
  const isCut = leaving.walk.kind === 'cut short' || entering.walk.kind === 'cut short';
  if (isCut) return cornerBetween(leaving, entering);
  const front = finishEnd(leaving, run, rules, shoulders);
  const rear = finishEnd(entering, back, rules, shoulders);
  const rearPlace = rear.place === null ? null : mirroredPlace(rear.place, run.length);
  if (front.place !== null && rearPlace !== null && isBefore(rearPlace, front.place))
    return cornerBetween(leaving, entering);
  const tail = [...rear.path].reverse().map(reverseSegment);
  return {
    outOf: front.end,
    into: rear.end,
    path: [...front.path, ...runBetween(run, front.place, rearPlace), ...tail],
  };
}

function openEnd(edge: ChordEdge, which: 'from' | 'to', run: readonly Segment[], rules: TrimRules): OpenEnd {
  const crease = rules.creases[edge.crease];
  const setbackMm = rules.setbacksMm[edge.crease] ?? 0;
  const travel = scale(crease?.direction ?? subtract(edge.to, edge.from), edge.isForward ? 1 : -1);
  const frame: EndFrame = {
    corner: edge[which],
    origin: crease?.origin ?? edge.from,
    outward: which === 'to' ? travel : scale(travel, -1),
    inward: turnLeft(travel),
  };
  if (run.length === 0) return { edge, frame, setbackMm, walk: { kind: 'cut short' } };
  return { edge, frame, setbackMm, walk: walkEdge(run, frame, setbackMm, Math.max(setbackMm, rules.thicknessMm)) };
}

/** The point straight in from the corner at the depth of the tangent line. */
function straightIn(open: OpenEnd): Point {
  const depth = dot(subtract(open.frame.corner, open.frame.origin), open.frame.inward);
  return along(open.frame.corner, open.frame.inward, open.setbackMm - depth);
}

/** End of a tangent edge, the path from it to the boundary, and where on the run it arrives (null = at the corner). */
function finishEnd(
  open: OpenEnd,
  run: readonly Segment[],
  rules: TrimRules,
  shoulders: ShoulderEnd[],
): { readonly end: TrimEnd; readonly path: readonly Segment[]; readonly place: RunPlace | null } {
  const inside = straightIn(open);
  if (open.walk.kind === 'side') {
    const depth = dot(subtract(open.frame.corner, open.frame.origin), open.frame.inward);
    if (depth <= open.setbackMm + COINCIDENT_MM) {
      return {
        end: { kind: 'side', point: open.walk.place.point, tangent: open.walk.tangent },
        path: [],
        place: open.walk.place,
      };
    }
    // The panel has to reach beyond its corner: it is carried straight on.
    return {
      end: { kind: 'side', point: inside, tangent: open.walk.tangent },
      path: [line(inside, open.frame.corner)],
      place: null,
    };
  }
  const size = reliefSize(rules.reliefs, rules.radiiMm[open.edge.crease] ?? 0, rules.thicknessMm);
  const relief =
    rules.reliefs.mode === 'automatic' ? cutRelief(run, open.frame, open.setbackMm, size, rules.reliefs.shape) : null;
  shoulders.push({
    crease: open.edge.crease,
    corner: open.frame.corner,
    tangentPoint: inside,
    isRelieved: relief !== null,
    widthMm: size.widthMm,
    depthMm: size.depthMm,
  });
  const end: TrimEnd = { kind: 'shoulder', point: inside, tangent: null };
  if (relief === null) return { end, path: [line(inside, open.frame.corner)], place: null };
  return { end, path: relief.path, place: relief.place };
}

/** Two bends whose strips meet: the panel ends where their tangent lines cross. */
function cornerBetween(leaving: OpenEnd, entering: OpenEnd): RunTrim | null {
  const first = leaving.frame.outward;
  const second = scale(entering.frame.outward, -1);
  const sine = cross(first, second);
  const from = straightIn(leaving);
  const to = straightIn(entering);
  if (sine > CORNER_SINE) {
    const steps = cross(subtract(to, from), second) / sine;
    const end: TrimEnd = { kind: 'corner', point: along(from, first, steps), tangent: null };
    return { outOf: end, into: end, path: [] };
  }
  const isOneCorner = distance(leaving.frame.corner, entering.frame.corner) <= 4 * COINCIDENT_MM;
  if (!isOneCorner || dot(first, second) < 0) return null;
  const end = (point: Point): TrimEnd => ({ kind: 'shoulder', point, tangent: null });
  const isLevel = Math.abs(sine) <= COINCIDENT_MM;
  const path = isLevel ? [line(from, to)] : [line(from, leaving.frame.corner), line(leaving.frame.corner, to)];
  return { outOf: end(from), into: end(to), path };
}
