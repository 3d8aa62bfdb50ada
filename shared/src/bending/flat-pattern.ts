import { biarc } from '../geometry/biarc';
import { joinPieces } from '../geometry/chain';
import { clockwise, loopBounds, signedArea } from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop, Segment } from '../geometry/path';
import type { Bounds, Point } from '../geometry/point';
import { line } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { moveLoop, shiftBy } from '../geometry/transform';
import { add, along, between, dot, scale, subtract, turnLeft, turnRight } from '../geometry/vector';
import type { Crease } from './crease';
import type { BendZone, DevelopmentProblem, FlatHole, FlatSlot, Panel } from './development';
import type { ReliefSettings } from './layout';
import { carryPoint } from './layout-to-flat';
import type { LayoutCarrier } from './layout-to-flat';
import type { Face, Hinge, PanelTree } from './panels';
import { trimFace } from './panel-trim';
import type { ShoulderEnd, TrimEnd, TrimmedFace } from './panel-trim';
import type { ResolvedBend } from './resolved-bend';

/** The blank's geometry, before its tables. */
export interface Unfolded {
  readonly panels: readonly Panel[];
  readonly zones: readonly BendZone[];
  readonly outer: Loop;
  readonly cutouts: readonly Loop[];
  readonly holes: readonly FlatHole[];
  readonly slots: readonly FlatSlot[];
  readonly bounds: Bounds;
  /** Ends of bends beside sheet that goes on, with the panel they were found on. */
  readonly shoulders: readonly { readonly panel: number; readonly end: ShoulderEnd }[];
  /** Openings that no bend line crosses, in flat-pattern coordinates. */
  readonly openings: readonly { readonly id: string; readonly loop: Loop }[];
  /** How far each panel was shifted from the layout. */
  readonly shifts: readonly Point[];
}

export type UnfoldResult =
  | { readonly ok: true; readonly unfolded: Unfolded }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/**
 * Lays the panels out flat: each is cut back to its tangent lines and moved so that between the tangent lines of every bend there
 * is exactly its allowance. The base panel stays where the layout has it.
 */
export function unfold(
  tree: PanelTree,
  creases: readonly Crease[],
  bends: readonly ResolvedBend[],
  reliefs: ReliefSettings,
): UnfoldResult {
  const rules = {
    creases,
    setbacksMm: bends.map(({ layoutSetbackMm }) => layoutSetbackMm),
    radiiMm: bends.map(({ geometry }) => geometry.insideRadiusMm),
    thicknessMm: bends[0]?.geometry.thicknessMm ?? 1,
    reliefs,
  };
  const problems: DevelopmentProblem[] = [];
  const trimmed: TrimmedFace[] = [];
  for (const face of tree.faces) {
    const result = trimFace(face, rules);
    if (result.ok) trimmed.push(result.face);
    else problems.push(tooClose(result.creases, creases));
  }
  if (problems.length > 0) return { ok: false, problems };
  const shifts = placeFaces(tree, creases, bends);
  const zones = tree.hinges.flatMap((hinge) => zonesOf(hinge, creases, bends, trimmed, shifts));
  const carrier: LayoutCarrier = {
    panels: tree.faces.map((face, index) => ({ layoutOuter: face.outer, shift: shifts[index] ?? { x: 0, y: 0 } })),
    zones: zones.map((zone) => ({ zone, layoutSetbackMm: setbackOf(zone, bends) })),
  };
  const placed = tree.faces.map((face, index) => placeOpenings(face, shifts[index] ?? { x: 0, y: 0 }, carrier));
  const panels = tree.faces.map((face, index): Panel => {
    const hinge = tree.hinges.find(({ child }) => child === index);
    return {
      index,
      parentIndex: hinge?.parent ?? null,
      bendId: hinge === undefined ? null : (bends[hinge.crease]?.declaration.id ?? null),
      outer: moveLoop(shiftBy(shifts[index] ?? { x: 0, y: 0 }), trimmed[index]?.outer ?? []),
      openings: placed[index]?.all.map(({ loop }) => loop) ?? [],
      placement: shiftBy(shifts[index] ?? { x: 0, y: 0 }),
      layoutOuter: face.outer.map(plainSegment),
    };
  });
  const boundary = joinPieces(
    [...panels.map(({ outer }) => outer), ...zones.map(({ outer }) => outer)],
    2 * COINCIDENT_MM,
  );
  const outer = boundary?.find((loop) => signedArea(loop) > 0);
  const bounds = outer === undefined ? null : loopBounds(outer);
  const isOnePiece = boundary?.filter((loop) => signedArea(loop) > 0).length === 1;
  if (boundary === null || outer === undefined || bounds === null || !isOnePiece)
    return { ok: false, problems: [overlapping(creases)] };
  const crossed = boundary.filter((loop) => loop !== outer).map(clockwise);
  const openings = placed.flatMap(({ all }) => all);
  const overlap = overlapInFlat([outer, ...crossed], openings, creases);
  if (overlap !== null) return { ok: false, problems: [overlap] };
  return {
    ok: true,
    unfolded: {
      panels,
      zones,
      outer,
      cutouts: [...crossed, ...placed.flatMap(({ cutouts }) => cutouts)],
      holes: placed.flatMap(({ holes }) => holes),
      slots: placed.flatMap(({ slots }) => slots),
      bounds,
      shoulders: trimmed.flatMap((face, panel) => face.shoulders.map((end) => ({ panel, end }))),
      openings,
      shifts,
    },
  };
}

function setbackOf(zone: BendZone, bends: readonly ResolvedBend[]): number {
  return bends.find(({ declaration }) => declaration.id === zone.bendId)?.layoutSetbackMm ?? 0;
}

interface PlacedOpenings {
  readonly all: readonly { readonly id: string; readonly loop: Loop }[];
  readonly cutouts: readonly Loop[];
  readonly holes: readonly FlatHole[];
  readonly slots: readonly FlatSlot[];
}

/** Openings of a face in the flat pattern. Holes and slots keep their size even where their middle falls into a bend zone. */
function placeOpenings(face: Face, shift: Point, carrier: LayoutCarrier): PlacedOpenings {
  const cutouts = face.cutouts.map(({ id, loop }) => ({ id, loop: moveLoop(shiftBy(shift), loop) }));
  const holes: FlatHole[] = [];
  const slots: FlatSlot[] = [];
  const features = face.features.map((sized) => {
    const { feature, loop } = sized;
    const middle = feature.kind === 'hole' ? feature.centre : between(feature.from, feature.to, 0.5);
    const own = subtract(carryPoint(carrier, middle), middle);
    if (feature.kind === 'slot')
      slots.push({
        featureId: feature.id,
        from: add(feature.from, own),
        to: add(feature.to, own),
        widthMm: feature.widthMm,
      });
    else
      holes.push({
        featureId: feature.id,
        centre: add(feature.centre, own),
        diameterMm: sized.diameterMm ?? 0,
        purpose: feature.purpose,
      });
    return { id: feature.id, loop: moveLoop(shiftBy(own), loop) };
  });
  return { all: [...cutouts, ...features], cutouts: cutouts.map(({ loop }) => loop), holes, slots };
}

/** Face edges carry what they are for; a boundary that leaves the kernel does not. */
function plainSegment(segment: Segment): Segment {
  return segment.kind === 'line' ? line(segment.from, segment.to) : { ...segment };
}

function placeFaces(tree: PanelTree, creases: readonly Crease[], bends: readonly ResolvedBend[]): readonly Point[] {
  const shifts: Point[] = [{ x: 0, y: 0 }];
  for (const hinge of tree.hinges) {
    const bend = bends[hinge.crease];
    const towardsChild = childNormal(hinge, creases);
    const gapMm = bend === undefined ? 0 : bend.allowanceMm - 2 * bend.layoutSetbackMm;
    shifts[hinge.child] = along(shifts[hinge.parent] ?? { x: 0, y: 0 }, towardsChild, gapMm);
  }
  return shifts;
}

function childNormal(hinge: Hinge, creases: readonly Crease[]): Point {
  const direction = creases[hinge.crease]?.direction ?? { x: 1, y: 0 };
  return hinge.isChildLeft ? turnLeft(direction) : turnRight(direction);
}

function zonesOf(
  hinge: Hinge,
  creases: readonly Crease[],
  bends: readonly ResolvedBend[],
  trimmed: readonly TrimmedFace[],
  shifts: readonly Point[],
): readonly BendZone[] {
  const bend = bends[hinge.crease];
  const crease = creases[hinge.crease];
  if (bend === undefined || crease === undefined) return [];
  const towardsChild = childNormal(hinge, creases);
  const alongZone = turnRight(towardsChild);
  return hinge.chords.flatMap((chord): readonly BendZone[] => {
    const find = (face: number): readonly [TrimEnd, TrimEnd] | null => {
      const found = trimmed[face]?.chords.find((one) => one.crease === hinge.crease && one.chord === chord);
      if (found === undefined) return null;
      // The child lies to the left of `alongZone`, which runs with the bend line only when it lies to the left of that too.
      return hinge.isChildLeft ? [found.start, found.end] : [found.end, found.start];
    };
    const parent = find(hinge.parent);
    const child = find(hinge.child);
    if (parent === null || child === null) return [];
    const parentShift = shifts[hinge.parent] ?? { x: 0, y: 0 };
    const childShift = shifts[hinge.child] ?? { x: 0, y: 0 };
    const corners = [0, 1].map((side) => {
      const [low, high] = matchEnds(
        parent[side === 0 ? 0 : 1],
        child[side === 0 ? 0 : 1],
        alongZone,
        side === 0 ? -1 : 1,
      );
      return {
        parent: add(low.point, parentShift),
        child: add(high.point, childShift),
        leaving: low.tangent,
        arriving: high.tangent,
      };
    });
    const [start, end] = corners;
    if (start === undefined || end === undefined) return [];
    const isBlended = bend.declaration.sideEdges === 'blended';
    const outer = [
      line(start.parent, end.parent),
      ...zoneSide(end.parent, end.leaving, end.child, end.arriving, isBlended),
      line(end.child, start.child),
      ...reversed(zoneSide(start.parent, start.leaving, start.child, start.arriving, isBlended)),
    ];
    return [
      {
        bendId: bend.declaration.id,
        parentIndex: hinge.parent,
        childIndex: hinge.child,
        origin: start.parent,
        along: alongZone,
        towardsChild,
        bendAllowanceMm: bend.allowanceMm,
        bendAngleDeg: bend.geometry.bendAngleDeg,
        direction: bend.declaration.direction,
        insideRadiusMm: bend.geometry.insideRadiusMm,
        kFactor: bend.geometry.kFactor,
        kHalfWidth: bend.kHalfWidth,
        outer,
      },
    ];
  });
}

/** Where either panel goes on beside the bend, the zone is no wider than the narrower of the two. */
function matchEnds(parent: TrimEnd, child: TrimEnd, alongZone: Point, outwards: 1 | -1): readonly [TrimEnd, TrimEnd] {
  if (parent.kind === 'side' && child.kind === 'side') return [parent, child];
  const reach = (end: TrimEnd): number => dot(end.point, alongZone) * outwards;
  const narrow = (end: TrimEnd, other: TrimEnd): TrimEnd => {
    const surplus = reach(end) - reach(other);
    if (other.kind === 'side' || surplus <= COINCIDENT_MM) return end;
    return { ...end, point: along(end.point, alongZone, -surplus * outwards), tangent: null };
  };
  const low = narrow(parent, child);
  return [low, narrow(child, low)];
}

/** The side of a bend zone from the parent's corner to the child's: straight, or carried on without a kink. */
function zoneSide(
  from: Point,
  leaving: Point | null,
  to: Point,
  arriving: Point | null,
  isBlended: boolean,
): readonly Segment[] {
  if (!isBlended || leaving === null || arriving === null) return [line(from, to)];
  // Boundaries were followed away from the bend on both panels; through the zone the parent's is travelled the other way.
  return biarc(from, scale(leaving, -1), to, arriving);
}

function reversed(segments: readonly Segment[]): readonly Segment[] {
  return [...segments]
    .reverse()
    .map((segment) =>
      segment.kind === 'line'
        ? line(segment.to, segment.from)
        : { ...segment, from: segment.to, to: segment.from, clockwise: !segment.clockwise },
    );
}

function tooClose(indices: readonly number[], creases: readonly Crease[]): DevelopmentProblem {
  const named = [...indices].sort((a, b) => a - b).flatMap((index) => creases[index] ?? []);
  const names = named.map(({ name }) => name).join(' and ');
  const message =
    named.length > 1
      ? `Bends ${names} are too close: no flat is left between them.`
      : `Bend ${names} leaves no flat on its panel.`;
  return { code: 'bendTooClose', message, ids: named.map(({ bend }) => bend.id) };
}

function overlapping(creases: readonly Crease[]): DevelopmentProblem {
  return {
    code: 'outlineNotSimple',
    message: 'Laid out flat, the part would overlap itself. Move the bends apart or cut the sheet free between them.',
    ids: creases.map(({ bend }) => bend.id),
  };
}

function overlapInFlat(
  boundaries: readonly Loop[],
  openings: readonly { readonly id: string; readonly loop: Loop }[],
  creases: readonly Crease[],
): DevelopmentProblem | null {
  const crossings = findCrossings([...boundaries, ...openings.map(({ loop }) => loop)], COINCIDENT_MM);
  if (crossings.length === 0) return null;
  const indices = crossings.flatMap(({ first, second }) => [first.loopIndex, second.loopIndex]);
  const isOfPanels = crossings.some(
    ({ first, second }) => first.loopIndex < boundaries.length && second.loopIndex < boundaries.length,
  );
  if (isOfPanels) return overlapping(creases);
  const ids = indices.flatMap((index) => openings[index - boundaries.length]?.id ?? []);
  const message = 'In the flat pattern these openings run over an edge, a relief or each other.';
  return { code: 'outlineNotSimple', message, ids: [...new Set(ids)] };
}
