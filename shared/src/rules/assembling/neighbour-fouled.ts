import { STANDARD_BRAKE } from '../../bending/leg-gains';
import type { Development, Panel } from '../../bending/development';
import { direction3 } from '../../bending/fold';
import type { PieceName } from '../../brake/plates';
import { TOUCHING_MM } from '../../brake/prism';
import type { Prism } from '../../brake/prism';
import { type ConvexGap, convexDepthMm, convexGap, extent } from '../../geometry/convex-distance';
import type { Point, Point3 } from '../../geometry/point';
import { cross3, dot3, length3, subtract3, unit3 } from '../../geometry/vector3';
import type { Neighbour } from '../../part/assembly';
import { type CoatSpread, NO_COAT } from '../../spread/causes';
import { spreadOf } from '../../spread/spread';
import { formatDecimal } from '../../units/length';
import type { Finding } from '../finding';
import { freeEdge } from '../flange-too-short';
import { LIMIT_SLACK_MM } from '../limits';
import { mendThatHolds } from '../mend-that-holds';
import { pieceInWords } from '../piece-in-words';
import { type RuleContext, nameOf, placeOfFlat } from '../rule-context';
import { finishOf } from './assembled-part';
import {
  type FormedBodies,
  type FormedBody,
  edgeDirections,
  faceDirections,
  formedBodies,
  neighbourPrism,
  prismCorners,
} from './formed-bodies';
import { NEIGHBOUR_GAP } from './limits';

/** A piece of the part by a neighbour. `gapMm` is negative by the depth where both overlap. */
interface Meeting {
  readonly body: FormedBody;
  readonly gapMm: number;
  readonly requiredMm: number;
  readonly at: Point3;
}

/**
 * The fully formed part against the solids around it. Sharing room is a blocker, told with the depth; less air than the flange's tip
 * may be off, and no less than 1 mm, is a caution. The coat adds its thickness.
 */
export function checkNeighbourFouled(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  const neighbours = document.assembly?.neighbours ?? [];
  if (development === null || neighbours.length === 0) return [];
  const formed = formedBodies(development);
  const required = requiredBy(context, development);
  return neighbours.flatMap((neighbour) => {
    const solid = neighbourPrism(neighbour);
    const worst = formed.bodies
      .flatMap((body) => meet(body, solid, required) ?? [])
      .reduce<Meeting | null>(
        (known, one) => (known === null || missingOf(one) > missingOf(known) ? one : known),
        null,
      );
    if (worst === null || missingOf(worst) <= LIMIT_SLACK_MM) return [];
    return [describe(context, development, { formed, neighbour, solid, worst })];
  });
}

function missingOf({ gapMm, requiredMm }: Meeting): number {
  return requiredMm - gapMm;
}

/** Air that a piece needs, mm: a tip a metre up may be 17 off, so no fixed reach does. Tips are worked out when first asked for. */
function requiredBy(context: RuleContext, development: Development): (of: PieceName) => number {
  const finish = finishOf(context);
  const coat: CoatSpread =
    finish === null ? NO_COAT : { lowMm: finish.buildUpPerSideMm.low, highMm: finish.buildUpPerSideMm.high };
  let tips: ReadonlyMap<string, number> | null = null;
  const known = (): ReadonlyMap<string, number> => {
    const plan = { brake: STANDARD_BRAKE, coat: NO_COAT, gauging: new Map<string, never>() };
    const sizes = spreadOf(development, plan).filter(({ kind }) => kind === 'tip');
    return new Map(sizes.flatMap(({ ids, halfWidthMm }) => ids.map((id) => [id, halfWidthMm] as const)));
  };
  return (of) => {
    const bendId = bendOf(development, of);
    tips ??= known();
    const tipMm = bendId === null ? 0 : (tips.get(bendId) ?? 0);
    return Math.max(NEIGHBOUR_GAP.mm, tipMm) + coat.highMm;
  };
}

/** Bend behind which a piece lies; null for the base. */
function bendOf({ panels, zones }: Development, { kind, index }: PieceName): string | null {
  return (kind === 'panel' ? panels[index]?.bendId : zones[index]?.bendId) ?? null;
}

/** A piece and a neighbour, if they are nearer to each other than the air that the piece needs. */
function meet(body: FormedBody, solid: Prism, required: (of: PieceName) => number): Meeting | null {
  const requiredMm = required(body.of);
  const apartMm = (one: Prism) => length3(subtract3(one.centre, solid.centre)) - one.radius - solid.radius;
  if (apartMm(body.around) > requiredMm) return null;
  const corners = prismCorners(solid);
  let nearest: ConvexGap | null = null;
  let depthMm = 0;
  for (const piece of body.prisms) {
    if (apartMm(piece) > (nearest?.distanceMm ?? requiredMm)) continue;
    const gap = convexGap(prismCorners(piece), corners);
    if (nearest === null || gap.distanceMm < nearest.distanceMm) nearest = gap;
    if (gap.distanceMm === 0) depthMm = Math.max(depthMm, depthOf(piece, solid, corners));
  }
  if (nearest === null || nearest.distanceMm > requiredMm) return null;
  const isOverlap = depthMm > TOUCHING_MM;
  // A plate is cut into triangles where it has openings; how far it reaches in is measured on the whole of it.
  const wholeMm = isOverlap && body.of.kind === 'panel' ? depthOf(body.around, solid, corners) : depthMm;
  return {
    body,
    gapMm: isOverlap ? -wholeMm : nearest.distanceMm,
    requiredMm,
    at: nearest.from,
  };
}

/** Prisms of more sides than this are round: the edges of their ends part nothing that their faces don't. */
const ROUND_SIDES = 24;

function depthOf(piece: Prism, solid: Prism, corners: readonly Point3[]): number {
  const edgesOf = ({ polygon, pose }: Prism): readonly Point3[] =>
    polygon.length > ROUND_SIDES ? [pose.uz] : [pose.uz, ...edgeDirections(polygon, pose)];
  const across = edgesOf(piece).flatMap((a) => edgesOf(solid).map((b) => cross3(a, b)));
  const directions = [
    ...faceDirections(piece),
    ...faceDirections(solid),
    ...across.filter((one) => length3(one) > 1e-6).map(unit3),
  ];
  return convexDepthMm(prismCorners(piece), corners, directions);
}

function describe(
  context: RuleContext,
  development: Development,
  found: {
    readonly formed: FormedBodies;
    readonly neighbour: Neighbour;
    readonly solid: Prism;
    readonly worst: Meeting;
  },
): Finding {
  const { neighbour, worst } = found;
  const id = `neighbourFouled-${neighbour.id}`;
  const isOverlap = worst.gapMm < 0;
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const piece = pieceInWords(context, development, worst.body.of);
  const bendId = bendOf(development, worst.body.of);
  return {
    id,
    rule: 'neighbourFouled',
    severity: isOverlap ? 'blocker' : 'caution',
    title: isOverlap ? `It runs into ${neighbour.name}` : `It comes close to ${neighbour.name}`,
    detail: isOverlap
      ? `${neighbour.name} reaches ${mm(-worst.gapMm)} mm into ${piece}.`
      : `Between ${piece} and ${neighbour.name} there are ${mm(worst.gapMm)} mm; parts come out so differently that ` +
        `${mm(worst.requiredMm)} are wanted.`,
    foundMm: worst.gapMm,
    requiredMm: worst.requiredMm,
    why: NEIGHBOUR_GAP.why,
    ids: bendId === null ? [] : [bendId],
    at: placeOfFlat(development, flatOf(development, found.formed, worst)),
    advice: 'Shorten or move the flange, cut a way round it, or move what is there.',
    mend: shorten(context, development, id, found),
  };
}

/** Where in the flat pattern a place of a piece is, about: bends are told by their panel's side. */
function flatOf({ zones }: Development, { poses }: FormedBodies, { body, at }: Meeting): Point {
  const { kind, index } = body.of;
  const zone = kind === 'zone' ? zones[index] : undefined;
  if (zone !== undefined) return zone.origin;
  const pose = poses[index];
  if (pose === undefined) return { x: 0, y: 0 };
  const off = subtract3(at, pose.origin);
  return { x: dot3(off, pose.ux), y: dot3(off, pose.uy) };
}

/** Slides a flange's free edge back until it ends before the neighbour. */
function shorten(
  context: RuleContext,
  development: Development,
  findingId: string,
  { formed, solid, worst }: { readonly formed: FormedBodies; readonly solid: Prism; readonly worst: Meeting },
): Finding['mend'] {
  const { kind, index } = worst.body.of;
  const panel: Panel | undefined = kind === 'panel' ? development.panels[index] : undefined;
  const pose = formed.poses[index];
  const zone = development.zones.find(({ childIndex }) => childIndex === index);
  if (panel === undefined || pose === undefined || zone === undefined) return null;
  const edgeId = freeEdge(context, development, panel, zone.towardsChild);
  if (edgeId === null) return null;
  const outwards = direction3(pose, zone.towardsChild);
  const tipMm = extent(prismCorners(worst.body.around), outwards).high;
  const byMm = tipMm - extent(prismCorners(solid), outwards).low + worst.requiredMm;
  if (byMm <= 0) return null;
  const label = `Shorten the flange at ${nameOf(context, zone.bendId)} by ${formatDecimal(byMm, 2)} mm`;
  return mendThatHolds(context, findingId, label, [{ kind: 'slideEdge', edgeId, byMm: -byMm }]);
}
