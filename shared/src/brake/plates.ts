import type { BendZone, Development, Panel } from '../bending/development';
import { panelRegions } from '../bending/flat-regions';
import { LYING_FLAT, direction3, placeIn, placeInZone, poseBehind } from '../bending/fold';
import type { Pose } from '../bending/fold';
import { flattenLoop, polygonArea } from '../geometry/flatten';
import type { Point } from '../geometry/point';
import { CHORD_MM } from '../geometry/tolerance';
import { triangulate } from '../geometry/triangulate';
import { along, dot, subtract } from '../geometry/vector';
import { convexHull, posed, prism, prismsOverlap } from './prism';
import type { Prism } from './prism';

/** A thick piece of sheet in its own axes: one convex prism around it, and the convex prisms it really consists of. */
export interface Shape {
  readonly around: Prism;
  /** Null when `around` is the piece itself. Worked out when first asked for. */
  readonly pieces: () => readonly Prism[] | null;
}

/** Which piece of the part it is: a panel, or the bend zone of that index. */
export interface PieceName {
  readonly kind: 'panel' | 'zone';
  readonly index: number;
}

/** A piece of the part somewhere in space. */
export interface Body {
  readonly of: PieceName;
  readonly shape: Shape;
  readonly around: Prism;
}

/** A part made ready for being looked at in any state of bending. */
export interface Plates {
  readonly development: Development;
  readonly panels: readonly Shape[];
  readonly zonesFlat: readonly Shape[];
  readonly zonesFormed: readonly Shape[];
  /** Index of each panel's zone towards its parent; null for the base. */
  readonly zoneOf: readonly (number | null)[];
}

/** A bend stands for its arc by straight pieces of at most this many degrees: its faces are off by 0.2 % of their radius. */
const STRIP_DEG = 15;

/** Counts tests of overlap, so that a search comes to an end whatever the part. */
export interface TestBudget {
  left: number;
}

/** Panels by their outlines less their openings, arcs within 0.05 mm; bend zones whole, openings in them not taken out. */
export function layOutPlates(development: Development): Plates {
  const { panels, zones, stock } = development;
  const allOpenings = panels.flatMap(({ openings }) => openings);
  return {
    development,
    panels: panels.map((panel) =>
      panelShape(panel, stock.thicknessMm, () => panelRegions(panel, zones, allOpenings).map(cornersOf)),
    ),
    zonesFlat: zones.map((zone) => {
      const outer = convexHull(flattenLoop(zone.outer, CHORD_MM));
      return whole(prism(LYING_FLAT, outer, 0, stock.thicknessMm));
    }),
    zonesFormed: zones.map((zone) => formedShape(zone, stock.thicknessMm)),
    zoneOf: panels.map(({ index }) => {
      const at = zones.findIndex(({ childIndex }) => childIndex === index);
      return at < 0 ? null : at;
    }),
  };
}

function whole(around: Prism): Shape {
  return { around, pieces: () => null };
}

function cornersOf({ outer, openings }: ReturnType<typeof panelRegions>[number]) {
  return {
    outer: flattenLoop(outer, CHORD_MM),
    openings: openings.map((loop) => flattenLoop(loop, CHORD_MM)),
  };
}

/** Areas nearer than this are equal: a hull that adds no more is the outline, mm2. */
const SAME_AREA_MM2 = 1e-3;

function panelShape(panel: Panel, thicknessMm: number, regions: () => readonly ReturnType<typeof cornersOf>[]): Shape {
  const outline = flattenLoop(panel.outer, CHORD_MM);
  const hull = convexHull(outline);
  const around = prism(LYING_FLAT, hull, 0, thicknessMm);
  const isConvex = polygonArea(hull) - polygonArea(outline) < SAME_AREA_MM2 && panel.openings.length === 0;
  if (isConvex) return whole(around);
  let known: readonly Prism[] | null = null;
  return { around, pieces: () => (known ??= regions().flatMap((region) => triangles(region, thicknessMm))) };
}

function triangles({ outer, openings }: ReturnType<typeof cornersOf>, thicknessMm: number): readonly Prism[] {
  const points = [outer, ...openings].flat();
  const indices = triangulate(outer, openings);
  const found: Prism[] = [];
  for (let at = 0; at + 2 < indices.length; at += 3) {
    const corners = [0, 1, 2].flatMap((side) => points[indices[at + side] ?? 0] ?? []);
    found.push(prism(LYING_FLAT, corners, 0, thicknessMm));
  }
  return found;
}

/** A formed bend in the axes (towards the child, up from face B, along the bend) at its origin on face B. */
function formedShape(zone: BendZone, thicknessMm: number): Shape {
  const outline = flattenLoop(zone.outer, CHORD_MM);
  const alongs = outline.map((point) => dot(subtract(point, zone.origin), zone.along));
  const [low, high] = [Math.min(...alongs), Math.max(...alongs)];
  // Even, so that the middle of the bend lies on its faces.
  const count = 2 * Math.max(1, Math.ceil(zone.bendAngleDeg / STRIP_DEG / 2));
  const section = (strip: number, heightMm: number): Point => {
    const point = along(zone.origin, zone.towardsChild, (zone.bendAllowanceMm * strip) / count);
    const { at } = placeInZone(zone, LYING_FLAT, thicknessMm, 1, point, heightMm);
    return { x: dot(subtract(at, zone.origin), zone.towardsChild), y: at.z };
  };
  const strips = Array.from({ length: count }, (_, strip) =>
    convexHull([
      section(strip, 0),
      section(strip + 1, 0),
      section(strip + 1, thicknessMm),
      section(strip, thicknessMm),
    ]),
  );
  const pieces = strips.map((strip) => prism(LYING_FLAT, strip, low, high));
  return { around: prism(LYING_FLAT, convexHull(strips.flat()), low, high), pieces: () => pieces };
}

/** Pose of every panel when the bends of some zones are made and the others still flat. */
export function posesWhen(plates: Plates, isMade: (zone: BendZone) => boolean): readonly Pose[] {
  const { development, zoneOf } = plates;
  const poses: Pose[] = [];
  for (const { index } of development.panels) {
    const zone = development.zones[zoneOf[index] ?? -1];
    const parent = zone === undefined ? undefined : poses[zone.parentIndex];
    poses[index] =
      zone === undefined || parent === undefined
        ? LYING_FLAT
        : poseBehind(zone, parent, development.stock.thicknessMm, isMade(zone) ? 1 : 0);
  }
  return poses;
}

/** All pieces of the part in that state. `poses` are those of the same state. */
export function bodiesWhen(
  plates: Plates,
  poses: readonly Pose[],
  isMade: (zone: BendZone) => boolean,
): readonly Body[] {
  const { panels, zones } = plates.development;
  const ofPanels = panels.flatMap(({ index }) =>
    bodyOf({ kind: 'panel', index }, plates.panels[index], poses[index] ?? LYING_FLAT),
  );
  const ofZones = zones.flatMap((zone, index) => {
    const parent = poses[zone.parentIndex] ?? LYING_FLAT;
    return isMade(zone)
      ? bodyOf({ kind: 'zone', index }, plates.zonesFormed[index], poseOfFormed(zone, parent))
      : bodyOf({ kind: 'zone', index }, plates.zonesFlat[index], parent);
  });
  return [...ofPanels, ...ofZones];
}

function bodyOf(of: PieceName, shape: Shape | undefined, pose: Pose): readonly Body[] {
  return shape === undefined ? [] : [{ of, shape, around: posed(shape.around, pose) }];
}

function poseOfFormed(zone: BendZone, parent: Pose): Pose {
  return {
    origin: placeIn(parent, zone.origin, 0).at,
    ux: direction3(parent, zone.towardsChild),
    uy: parent.uz,
    uz: direction3(parent, zone.along),
  };
}

/** The same piece elsewhere. */
export function moved(body: Body, pose: Pose): Body {
  return { ...body, around: posed(body.around, pose) };
}

/** Whether two pieces of the part share room. */
export function bodiesOverlap(a: Body, b: Body, budget: TestBudget): boolean {
  if (!tested(a.around, b.around, budget)) return false;
  const [ofA, ofB] = [piecesOf(a), piecesOf(b)];
  if (ofA === null && ofB === null) return true;
  return (ofA ?? [a.around]).some((one) => touches(one, b, ofB, budget));
}

/** Whether a piece of the part shares room with a tool. */
export function meetsTool(body: Body, tool: Prism, budget: TestBudget): boolean {
  if (!tested(tool, body.around, budget)) return false;
  const pieces = piecesOf(body);
  return pieces === null || pieces.some((piece) => tested(tool, piece, budget));
}

function touches(one: Prism, body: Body, pieces: readonly Prism[] | null, budget: TestBudget): boolean {
  if (!tested(one, body.around, budget)) return false;
  return pieces === null || pieces.some((piece) => tested(one, piece, budget));
}

function piecesOf({ shape, around }: Body): readonly Prism[] | null {
  return shape.pieces()?.map((piece) => posed(piece, around.pose)) ?? null;
}

function tested(a: Prism, b: Prism, budget: TestBudget): boolean {
  budget.left -= 1;
  return prismsOverlap(a, b);
}

/** Whether one bend makes both, or one of them is that bend. */
export function areJoined(development: Development, { of: a }: Body, { of: b }: Body): boolean {
  const panelsOf = ({ kind, index }: PieceName): readonly number[] => {
    const zone = kind === 'zone' ? development.zones[index] : undefined;
    return zone === undefined ? [] : [zone.parentIndex, zone.childIndex];
  };
  if (a.kind === 'panel' && b.kind === 'panel')
    return development.zones.some(
      ({ parentIndex, childIndex }) =>
        (parentIndex === a.index && childIndex === b.index) || (parentIndex === b.index && childIndex === a.index),
    );
  if (a.kind === 'panel') return panelsOf(b).includes(a.index);
  if (b.kind === 'panel') return panelsOf(a).includes(b.index);
  return false;
}
