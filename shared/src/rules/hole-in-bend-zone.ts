import type { BendZone, Development } from '../bending/development';
import type { Point } from '../geometry/point';
import { invert, moveLoop, movePoint, shiftBy } from '../geometry/transform';
import { add, between, dot, scale, subtract } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import { formatDecimal } from '../units/length';
import { type CutOpening, cutSheet } from './cut-openings';
import type { Finding, Severity } from './finding';
import { capital } from './in-words';
import { DIE_MOUTH, LIMIT_SLACK_MM, TANGENT_DISTANCE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listNames, nameOf, panelAt, placeOfFlat } from './rule-context';
import { type WholeBend, wholeBends, zoneReach } from './zone-reach';

/** An opening that comes too near to one bend. */
interface Intrusion {
  readonly opening: CutOpening;
  readonly zone: BendZone;
  readonly severity: Severity;
  /** From the bend's centre to the nearest rim, negative when the opening lies over the centre. */
  readonly rimFromCentreMm: number;
  readonly requiredMm: number;
  /** Unit vector in the flat pattern away from the bend. */
  readonly away: Point;
}

/**
 * Holes, slots and cut-outs near a bend. Within 2 T of a tangent line the opening is pulled out of shape: a blocker. Over
 * the die's mouth, V/2 from the bend's centre, the metal is not held: a caution. A cut-out that the bend runs across
 * interrupts it and is judged as a relief. Openings count where they lie beside the bend's own length.
 */
export function checkHoleInBendZone(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  const bends = wholeBends(development);
  const intrusions = cutSheet(context).openings.flatMap((opening) =>
    bends.flatMap((bend) => intrusionOf(development, opening, bend) ?? []),
  );
  return groupAlike(intrusions).map((group) => describe(context, development, group));
}

function intrusionOf(development: Development, opening: CutOpening, bend: WholeBend): Intrusion | null {
  const { zone } = bend;
  const { thicknessMm, vOpeningMm } = development.stock;
  const reach = zoneReach(opening.loop, bend);
  if (reach === null) return null;
  const { rimFromCentreMm, away } = reach;
  const halfMouthMm = DIE_MOUTH.shareOfV * vOpeningMm;
  const nearMm = zone.bendAllowanceMm / 2 + TANGENT_DISTANCE.overT * thicknessMm;
  const clearMm = Math.max(halfMouthMm, nearMm);
  if (opening.kind === 'cutout' && reach.lowMm < 0 && reach.highMm > 0) return null;
  if (rimFromCentreMm >= clearMm - LIMIT_SLACK_MM) return null;
  return {
    opening,
    zone,
    severity: rimFromCentreMm < nearMm - LIMIT_SLACK_MM ? 'blocker' : 'caution',
    rimFromCentreMm,
    requiredMm: clearMm,
    away,
  };
}

/** Openings at the same bend, of the same kind and depth, make one finding: a person moves them together. */
function groupAlike(intrusions: readonly Intrusion[]): readonly (readonly Intrusion[])[] {
  const groups = new Map<string, Intrusion[]>();
  for (const intrusion of intrusions) {
    const { zone, opening, severity, rimFromCentreMm, away } = intrusion;
    const side = dot(away, zone.towardsChild) > 0 ? 'child' : 'parent';
    const key = [zone.bendId, opening.kind, severity, side, rimFromCentreMm.toFixed(4)].join(' ');
    groups.set(key, [...(groups.get(key) ?? []), intrusion]);
  }
  return [...groups.values()];
}

function describe(context: RuleContext, development: Development, group: readonly Intrusion[]): Finding {
  const [first] = group;
  if (first === undefined) throw new RangeError('a group of openings has at least one');
  const { zone, opening, severity, rimFromCentreMm, requiredMm } = first;
  const mm = (valueMm: number) => formatDecimal(valueMm, 1);
  const names = group.map(({ opening: { id } }) => nameOf(context, id));
  const kind = { hole: 'hole', slot: 'slot', cutout: 'cut-out' }[opening.kind];
  const subject = `${kind}${group.length > 1 ? 's' : ''} ${listNames(names)}`;
  const bend = nameOf(context, zone.bendId);
  const { thicknessMm, vOpeningMm } = development.stock;
  const tangentMm = zone.bendAllowanceMm / 2 + TANGENT_DISTANCE.overT * thicknessMm;
  const whose = group.length > 1 ? 'Their rims sit' : 'Its rim sits';
  const isBlocker = severity === 'blocker';
  const commands = group.flatMap((intrusion) => moveAway(context, development, intrusion));
  const shiftMm = requiredMm - rimFromCentreMm;
  const who = group.length === 1 ? 'it' : group.length === 2 ? 'both' : 'all';
  const id = `holeInBendZone-${zone.bendId}-${group.map((intrusion) => intrusion.opening.id).join('-')}`;
  return {
    id,
    rule: 'holeInBendZone',
    severity,
    title: isBlocker ? `${capital(subject)} would be bent at ${bend}` : `${capital(subject)} may pull oval at ${bend}`,
    detail: isBlocker
      ? `${whose} ${mm(rimFromCentreMm)} mm from the centre of ${bend}. The metal is stretched up to ` +
        `${mm(zone.bendAllowanceMm / 2)} and pulled along up to ${mm(tangentMm)}.`
      : `${whose} ${mm(rimFromCentreMm)} mm from the centre of ${bend}. The V ${mm(vOpeningMm)} die gapes to ` +
        `${mm(DIE_MOUTH.shareOfV * vOpeningMm)} on either side, and nothing holds the sheet there.`,
    foundMm: rimFromCentreMm,
    requiredMm: isBlocker ? tangentMm : requiredMm,
    why: isBlocker ? TANGENT_DISTANCE.why : DIE_MOUTH.why,
    ids: [...group.map(({ opening: { id } }) => id), zone.bendId],
    at: placeOfFlat(development, opening.centre),
    advice: `Move ${who} ${formatDecimal(shiftMm, 2)} mm away from the bend, or cut ${who === 'it' ? 'it' : 'them'} after bending.`,
    mend:
      commands.length === group.length
        ? mendThatHolds(context, id, `Move ${who} ${formatDecimal(shiftMm, 2)} mm out`, commands)
        : null,
  };
}

/**
 * Straight away from the bend by what is missing, offered only when that leaves the opening clear of every bend. The
 * target is taken back through its own panel, because the flat pattern is shorter than the layout at each bend between.
 */
function moveAway(context: RuleContext, development: Development, intrusion: Intrusion): readonly PartCommand[] {
  const { opening, away, requiredMm, rimFromCentreMm } = intrusion;
  const shift = scale(away, requiredMm - rimFromCentreMm);
  const target = add(opening.centre, shift);
  const moved: CutOpening = { ...opening, centre: target, loop: moveLoop(shiftBy(shift), opening.loop) };
  const panel = panelAt(development, target);
  const feature = context.document.layout.features.find(({ id }) => id === opening.id);
  if (feature === undefined || panel === null) return [];
  if (wholeBends(development).some((bend) => intrusionOf(development, moved, bend) !== null)) return [];
  const from = feature.kind === 'hole' ? feature.centre : between(feature.from, feature.to, 0.5);
  const by = subtract(movePoint(invert(panel.placement), target), from);
  return [{ kind: 'moveFeature', featureId: opening.id, by }];
}
