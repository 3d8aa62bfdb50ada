import type { Development } from '../../bending/development';
import type { Feature } from '../../bending/layout';
import { placeIn } from '../../bending/fold';
import type { Pose } from '../../bending/fold';
import { TOUCHING_MM } from '../../brake/prism';
import type { Prism } from '../../brake/prism';
import type { Point } from '../../geometry/point';
import { scale, unit } from '../../geometry/vector';
import { type HexEnvelope, TOOL_SOURCE, findHexEnvelope } from '../../stock/fastener-heads';
import { HEX_SOURCE } from '../../stock/fastener-tables';
import { formatDecimal } from '../../units/length';
import type { Finding } from '../finding';
import { LIMIT_SLACK_MM, ruleFrom } from '../limits';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, layoutShift, nameOf, placeOfFlat, placeOfLayout } from '../rule-context';
import { allCalled, boltThread, flatPlaces, middleOf } from './assembled-part';
import { type FormedBodies, type FormedBody, formedBodies, neighbourPrism } from './formed-bodies';
import { panelIndexAt } from './inside-u';
import { TOOL_ROOM } from './limits';
import { type RoomAround, roomAround, swingDeg } from './tool-room';

type FaceName = 'A' | 'B';

/** How a bolt fares on one face of its panel. */
interface FaceRoom {
  readonly face: FaceName;
  /** What stands in the way, if anything does. */
  readonly lacks: 'head' | 'tool' | null;
  readonly drivenBy: 'socket' | 'spanner' | null;
  readonly room: RoomAround;
  readonly requiredMm: number;
  /** Nearest thing to a socket, which is what the hole has to move away from; and by how much. */
  readonly clear: { readonly place: Point | null; readonly byMm: number };
}

/** A bolted opening, looked at from both faces. */
interface Looked {
  readonly feature: Feature;
  readonly flatAt: Point;
  readonly faces: readonly FaceRoom[];
}

/**
 * Head or nut with its washer, and a socket or ring spanner on it, against everything else of the formed part and its neighbours. One
 * face of the panel is enough. No head on either face: a blocker; no tool: a caution; just one face: worth knowing which.
 */
export function checkFastenerRoom(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  if (development === null || document.assembly === undefined) return [];
  const bolted = document.layout.features.filter((feature) => envelopeOf(feature) !== null);
  if (bolted.length === 0) return [];
  const formed = formedBodies(development);
  const neighbours = document.assembly.neighbours.map(neighbourPrism);
  const looked = bolted.flatMap((feature) => lookAt(development, formed, neighbours, feature) ?? []);
  return [
    ...looked.flatMap((one) => tellOfNone(context, development, one)),
    ...(['A', 'B'] as const).flatMap((face) => tellOfFace(context, face, looked)),
  ];
}

function envelopeOf(feature: Feature): HexEnvelope | null {
  if (feature.kind === 'hole' && feature.purpose.kind !== 'clearance') return null;
  const thread = boltThread(feature);
  return thread === null ? null : findHexEnvelope(thread);
}

function lookAt(
  development: Development,
  { poses, bodies }: FormedBodies,
  neighbours: readonly Prism[],
  feature: Feature,
): Looked | null {
  const envelope = envelopeOf(feature);
  const places = flatPlaces(development, feature);
  const [flatAt] = places;
  const panel = flatAt === undefined ? null : panelIndexAt(development, flatAt);
  const pose = panel === null ? undefined : poses[panel];
  if (envelope === null || flatAt === undefined || panel === null || pose === undefined) return null;
  const others = bodies.filter(({ of }) => !(of.kind === 'panel' && of.index === panel));
  const faces = (['A', 'B'] as const).map((face) => {
    const rooms = places.map((at) => {
      const origin = placeIn(pose, at, face === 'A' ? development.stock.thicknessMm : 0).at;
      const { x, y, z } = pose.uz;
      const outwards: Pose = { ...pose, origin, uz: face === 'A' ? pose.uz : { x: -x, y: -y, z: -z } };
      return roomOn(face, outwards, envelope, { others, beside: besideOf(development, others, panel), neighbours });
    });
    return rooms.reduce((worst, one) => (worseOf(one, worst) ? one : worst));
  });
  return { feature, flatAt, faces };
}

/** Bends of the panel itself: where washers meet them is told by how they are seated. */
function besideOf({ zones }: Development, others: readonly FormedBody[], panel: number): readonly FormedBody[] {
  return others.filter(({ of }) => {
    const zone = of.kind === 'zone' ? zones[of.index] : undefined;
    return zone !== undefined && (zone.parentIndex === panel || zone.childIndex === panel);
  });
}

const RANK = { head: 2, tool: 1 } as const;

function worseOf(one: FaceRoom, other: FaceRoom): boolean {
  const rank = ({ lacks }: FaceRoom) => (lacks === null ? 0 : RANK[lacks]);
  if (rank(one) !== rank(other)) return rank(one) > rank(other);
  return one.room.radiusMm - one.requiredMm < other.room.radiusMm - other.requiredMm;
}

/** Half the width and length of a ring spanner's handle over its width across flats; from memory. */
const HANDLE = { halfWidth: 0.4, length: 12 } as const;

function roomOn(
  face: FaceName,
  pose: Pose,
  envelope: HexEnvelope,
  around: {
    readonly others: readonly FormedBody[];
    readonly beside: readonly FormedBody[];
    readonly neighbours: readonly Prism[];
  },
): FaceRoom {
  const all = [...around.others.flatMap(({ prisms }) => prisms), ...around.neighbours];
  const offWasher = [
    ...around.others.filter((body) => !around.beside.includes(body)).flatMap(({ prisms }) => prisms),
    ...around.neighbours,
  ];
  const { washerThicknessMm, washerRadiusMm, headRadiusMm, headHeightMm } = envelope;
  const fails = ({ radiusMm }: RoomAround, requiredMm: number) => radiusMm < requiredMm - LIMIT_SLACK_MM;
  const socketMm = envelope.socketRadiusMm + TOOL_ROOM.aroundMm;
  const socket = roomAround(pose, all, washerThicknessMm, washerThicknessMm + envelope.socketHeightMm);
  const clear = { place: socket.place, byMm: socketMm - socket.radiusMm };
  const lacking = (lacks: FaceRoom['lacks'], room: RoomAround, requiredMm: number): FaceRoom => {
    return { face, lacks, drivenBy: null, room, requiredMm, clear };
  };
  const washer = roomAround(pose, offWasher, TOUCHING_MM, washerThicknessMm);
  if (fails(washer, washerRadiusMm)) return lacking('head', washer, washerRadiusMm);
  const head = roomAround(pose, all, washerThicknessMm, washerThicknessMm + headHeightMm);
  if (fails(head, headRadiusMm)) return lacking('head', head, headRadiusMm);
  if (!fails(socket, socketMm)) return { ...lacking(null, socket, socketMm), drivenBy: 'socket' };
  const high = washerThicknessMm + envelope.ringHeightMm;
  const ring = roomAround(pose, all, washerThicknessMm, high);
  const flatsMm = envelope.headRadiusMm * Math.sqrt(3);
  const isSpanner =
    !fails(ring, envelope.ringRadiusMm + TOOL_ROOM.aroundMm) &&
    swingDeg(pose, all, {
      lengthMm: HANDLE.length * flatsMm,
      halfWidthMm: HANDLE.halfWidth * flatsMm,
      low: washerThicknessMm + headHeightMm / 2,
      high,
    }) >= TOOL_ROOM.swingDeg;
  return isSpanner ? { ...lacking(null, socket, socketMm), drivenBy: 'spanner' } : lacking('tool', socket, socketMm);
}

function tellOfNone(
  context: RuleContext,
  development: Development,
  { feature, flatAt, faces }: Looked,
): readonly Finding[] {
  const [first, ...rest] = faces;
  if (first === undefined || faces.some(({ lacks }) => lacks === null)) return [];
  const best = rest.reduce((known, one) => (worseOf(known, one) ? one : known), first);
  const isHead = best.lacks === 'head';
  const id = `noRoomForFastener-${feature.id}`;
  const name = nameOf(context, feature.id);
  const thread = boltThread(feature) ?? '';
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const { place, byMm } = best.clear;
  const words = (one: FaceRoom) =>
    `On face ${one.face} ${one.lacks === 'head' ? 'the head' : 'a socket'} wants ${mm(one.requiredMm)} mm from the bolt’s ` +
    `middle and has ${mm(one.room.radiusMm)}.`;
  const by = place === null ? null : layoutShift(development, flatAt, scale(unit(place), -byMm));
  return [
    {
      id,
      rule: 'noRoomForFastener',
      severity: isHead ? 'blocker' : 'caution',
      title: isHead ? `No room for the ${thread} head at ${name}` : `Neither socket nor spanner gets at ${name}`,
      detail: faces.map(words).join(' '),
      foundMm: best.room.radiusMm,
      requiredMm: best.requiredMm,
      why: isHead ? ruleFrom('a sharp hex or its washer, whichever is in the way', HEX_SOURCE) : TOOL_ROOM.why,
      ids: [feature.id],
      at: placeOfFlat(development, flatAt),
      advice: isHead
        ? 'Move the hole, take a smaller bolt, or turn the bolt round and put a low head there.'
        : 'Move the hole, use a socket head and a key, or fit this bolt before its neighbours.',
      mend:
        by === null
          ? null
          : mendThatHolds(context, id, `Move ${name} ${mm(byMm)} mm clear`, [
              { kind: 'moveFeature', featureId: feature.id, by },
            ]),
    },
  ];
}

/** Bolts that go in from one face alone, told once for each face. */
function tellOfFace(context: RuleContext, face: FaceName, looked: readonly Looked[]): readonly Finding[] {
  const only = looked.flatMap(({ feature, faces }) => {
    const working = faces.filter(({ lacks }) => lacks === null);
    const [one] = working;
    return working.length === 1 && one?.face === face ? [{ feature, drivenBy: one.drivenBy }] : [];
  });
  const [first] = only;
  if (first === undefined) return [];
  const ids = only.map(({ feature }) => feature.id);
  const spanner = only.filter(({ drivenBy }) => drivenBy === 'spanner').map(({ feature }) => feature.id);
  return [
    {
      id: `noRoomForFastener-face${face}`,
      rule: 'noRoomForFastener',
      severity: 'hint',
      title: `${ids.length === 1 ? 'The bolt' : 'Bolts'} of ${allCalled(context, ids)} ${ids.length === 1 ? 'goes' : 'go'} in from face ${face}`,
      detail:
        'On the other face something is in the way of head or tools.' +
        (spanner.length === 0 ? '' : ` ${allCalled(context, spanner)}: by spanner only, a socket does not fit.`),
      foundMm: null,
      requiredMm: null,
      why: ruleFrom('usual sockets and ring spanners', TOOL_SOURCE),
      ids,
      at: placeOfLayout(context, middleOf(first.feature)),
      advice: 'Nothing to mend; plan the order of assembling by it.',
      mend: null,
    },
  ];
}
