import { closeLoops, splitSegment } from '../geometry/chain';
import { pointInLoop, signedArea } from '../geometry/loop';
import type { LineSegment, Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { pointAt } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import type { Chord, Crease } from './crease';
import type { DevelopmentProblem } from './development';
import type { Sheet, SizedFeature } from './sheet';

/** An edge of a face that runs along a bend line. `isForward` when it runs the way the bend line does. */
export interface ChordEdge extends LineSegment {
  readonly crease: number;
  readonly chord: number;
  readonly isForward: boolean;
}

export type FaceEdge = Segment | ChordEdge;

/** Whether an edge of a face is a bend line and not the boundary of the sheet. */
export function isChordEdge(edge: FaceEdge): edge is ChordEdge {
  return 'crease' in edge;
}

/** A piece of the layout between bend lines, counter-clockwise, with the openings that no bend line crosses. */
export interface Face {
  readonly outer: readonly FaceEdge[];
  readonly cutouts: readonly { readonly id: string; readonly loop: Loop }[];
  readonly features: readonly SizedFeature[];
}

/** How a face hangs on its parent. Several chords when openings interrupt the bend. */
export interface Hinge {
  readonly crease: number;
  readonly chords: readonly number[];
  readonly parent: number;
  readonly child: number;
  /** Whether the child lies to the left of the bend line's direction. */
  readonly isChildLeft: boolean;
}

/** Faces in the order they are reached from the base, which is the first, and the hinges in the same order. */
export interface PanelTree {
  readonly faces: readonly Face[];
  readonly hinges: readonly Hinge[];
}

export type PanelTreeResult =
  | { readonly ok: true; readonly tree: PanelTree }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/**
 * Cuts the sheet along its bend lines into a tree of faces rooted at the one that holds the anchor.
 * Refuses rings of faces, bend lines that part nothing and an anchor off the sheet, naming the bends.
 */
export function cutPanels(sheet: Sheet, creases: readonly Crease[], baseAnchor: Point): PanelTreeResult {
  const loops = traceLoops(sheet, creases);
  if (loops === null) {
    const message = 'The outline and the bend lines do not part the sheet into panels.';
    return { ok: false, problems: [{ code: 'outlineNotSimple', message, ids: creases.map(({ bend }) => bend.id) }] };
  }
  const inner = bendsInsidePanels(loops, creases);
  if (inner.length > 0) return { ok: false, problems: inner };
  const faces = facesOf(loops, sheet, creases);
  const base = baseFace(faces, baseAnchor);
  if (base === null) {
    return {
      ok: false,
      problems: [{ code: 'baseAnchorOutside', message: 'The anchor of the base panel lies off the sheet.', ids: [] }],
    };
  }
  return growTree(faces, creases, base);
}

function chordEnds(creases: readonly Crease[]): readonly Point[] {
  return creases.flatMap(({ chords }) => chords.flatMap(({ from, to }) => [from, to]));
}

/** Outlines of faces, counter-clockwise, and openings that lie within them, clockwise. */
function traceLoops(sheet: Sheet, creases: readonly Crease[]): readonly (readonly FaceEdge[])[] | null {
  const ends = chordEnds(creases);
  const boundary: readonly FaceEdge[] = [sheet.outer, ...sheet.cutouts.map(({ loop }) => loop)]
    .flat()
    .flatMap((segment) => splitSegment(segment, ends, COINCIDENT_MM));
  const edges: readonly FaceEdge[] = [
    ...boundary,
    ...creases.flatMap((crease, index) => crease.chords.flatMap((chord, at) => bothWays(chord, index, at))),
  ];
  return closeLoops(edges, 2 * COINCIDENT_MM);
}

/**
 * Bends of a tab that is cut free inside a panel. The sheet goes on all round it, so its bend line is no part of a panel's outline:
 * left unsaid, tab and opening would be missing from the flat pattern.
 */
function bendsInsidePanels(
  loops: readonly (readonly FaceEdge[])[],
  creases: readonly Crease[],
): readonly DevelopmentProblem[] {
  return loops
    .filter((loop) => signedArea(loop) <= 0)
    .flatMap((loop): readonly DevelopmentProblem[] => {
      const indices = [...new Set(loop.filter(isChordEdge).map(({ crease }) => crease))].sort((a, b) => a - b);
      const found = indices.flatMap((index) => creases[index] ?? []);
      if (found.length === 0) return [];
      const names = found.map(({ name }) => name).join(' and ');
      const message = `Bend line ${names} lies inside a panel, with sheet all round it. Take the opening beside it to an edge.`;
      return [{ code: 'bendLineEndsInside', message, ids: found.map(({ bend }) => bend.id) }];
    });
}

function facesOf(loops: readonly (readonly FaceEdge[])[], sheet: Sheet, creases: readonly Crease[]): readonly Face[] {
  const ends = chordEnds(creases);
  const outers = loops.filter((loop) => signedArea(loop) > 0);
  const inner = sheet.cutouts.filter(({ loop }) => !loop.some((segment) => touchesAny(segment, ends)));
  return outers.map((outer) => ({
    outer,
    cutouts: inner.filter(({ loop }) => holds(outer, loop[0]?.from)),
    features: sheet.features.filter(({ feature }) => {
      const centre = feature.kind === 'hole' ? feature.centre : midpoint(feature.from, feature.to);
      return outer === outers.find((candidate) => holds(candidate, centre));
    }),
  }));
}

function bothWays(chord: Chord, crease: number, at: number): readonly ChordEdge[] {
  return [
    { kind: 'line', from: chord.from, to: chord.to, crease, chord: at, isForward: true },
    { kind: 'line', from: chord.to, to: chord.from, crease, chord: at, isForward: false },
  ];
}

function touchesAny(segment: Segment, points: readonly Point[]): boolean {
  return splitSegment(segment, points, COINCIDENT_MM).length > 1 || points.some((point) => isNear(point, segment.from));
}

function isNear(a: Point, b: Point): boolean {
  return Math.hypot(a.x - b.x, a.y - b.y) <= 2 * COINCIDENT_MM;
}

function holds(outer: Loop, point: Point | undefined): boolean {
  return point !== undefined && pointInLoop(point, outer, COINCIDENT_MM) !== 'outside';
}

function midpoint(a: Point, b: Point): Point {
  return pointAt({ kind: 'line', from: a, to: b }, 0.5);
}

function baseFace(faces: readonly Face[], anchor: Point): number | null {
  const strictly = faces.findIndex(({ outer }) => pointInLoop(anchor, outer, 0) === 'inside');
  const roughly = strictly === -1 ? faces.findIndex(({ outer }) => holds(outer, anchor)) : strictly;
  return roughly === -1 ? null : roughly;
}

function growTree(faces: readonly Face[], creases: readonly Crease[], base: number): PanelTreeResult {
  const neighbours = pairFaces(faces, creases);
  const problems: DevelopmentProblem[] = [];
  for (const pair of neighbours) {
    if (pair.left !== pair.right) continue;
    const crease = creases[pair.crease];
    const message = `Bend line ${crease?.name ?? ''} does not part the sheet: both of its sides are one panel.`;
    problems.push({ code: 'bendLineEndsInside', message, ids: crease === undefined ? [] : [crease.bend.id] });
  }
  if (problems.length > 0) return { ok: false, problems };
  const order = [base];
  const hinges: Hinge[] = [];
  const used = new Set<FacePair>();
  for (let at = 0; at < order.length; at += 1) {
    const face = order[at] ?? base;
    for (const pair of neighbours) {
      if (used.has(pair) || (pair.left !== face && pair.right !== face)) continue;
      used.add(pair);
      const other = pair.left === face ? pair.right : pair.left;
      if (order.includes(other)) {
        const ring = ringBends(face, other, pair.crease, order, hinges, creases);
        const names = ring.map(({ name }) => name).join(', ');
        const message = `Bends ${names} join panels into a ring, which cannot be folded.`;
        return { ok: false, problems: [{ code: 'panelRing', message, ids: ring.map(({ bend }) => bend.id) }] };
      }
      hinges.push({
        crease: pair.crease,
        chords: pair.chords,
        parent: at,
        child: order.length,
        isChildLeft: pair.left === other,
      });
      order.push(other);
    }
  }
  const ordered = order.flatMap((index) => faces[index] ?? []);
  return { ok: true, tree: { faces: ordered, hinges } };
}

interface FacePair {
  readonly crease: number;
  readonly chords: readonly number[];
  readonly left: number;
  readonly right: number;
}

/** Which two faces each bend line parts; chords of one bend between the same faces count as one. */
function pairFaces(faces: readonly Face[], creases: readonly Crease[]): readonly FacePair[] {
  const leftOf = new Map<string, number>();
  faces.forEach((face, index) => {
    for (const edge of face.outer) {
      if (isChordEdge(edge))
        leftOf.set(`${String(edge.crease)} ${String(edge.chord)} ${edge.isForward ? 'left' : 'right'}`, index);
    }
  });
  const pairs: FacePair[] = [];
  creases.forEach((crease, creaseIndex) => {
    crease.chords.forEach((_, chord) => {
      const left = leftOf.get(`${String(creaseIndex)} ${String(chord)} left`);
      const right = leftOf.get(`${String(creaseIndex)} ${String(chord)} right`);
      if (left === undefined || right === undefined) return;
      const known = pairs.findIndex(
        (pair) => pair.crease === creaseIndex && pair.left === left && pair.right === right,
      );
      const before = pairs[known];
      if (before === undefined) pairs.push({ crease: creaseIndex, chords: [chord], left, right });
      else pairs[known] = { ...before, chords: [...before.chords, chord] };
    });
  });
  return pairs;
}

/** Bends on the way round: from both faces up to the base, and the one that closes the ring. */
function ringBends(
  face: number,
  other: number,
  closing: number,
  order: readonly number[],
  hinges: readonly Hinge[],
  creases: readonly Crease[],
): readonly Crease[] {
  const wayUp = (start: number): readonly number[] => {
    const passed: number[] = [];
    let at = order.indexOf(start);
    for (
      let hinge = hinges.find(({ child }) => child === at);
      hinge !== undefined;
      hinge = hinges.find(({ child }) => child === at)
    ) {
      passed.push(hinge.crease);
      at = hinge.parent;
    }
    return passed;
  };
  const first = wayUp(face);
  const second = wayUp(other);
  const around = [
    ...first.filter((crease) => !second.includes(crease)),
    ...second.filter((crease) => !first.includes(crease)),
    closing,
  ];
  return [...new Set(around)].sort((a, b) => a - b).flatMap((index) => creases[index] ?? []);
}
