import type { Feature, HoleFeature, SlotFeature } from '../bending/layout';
import { distance } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { LIMIT_SLACK_MM, SMALLEST_CUT } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, nameOf, placeOfLayout } from './rule-context';

/**
 * Holes and slots against what a laser cuts through the sheet: 1 T (0.5 mm at least, slots 1 mm). Thin steel can go down
 * to half of that; there it is a caution, elsewhere a blocker.
 */
export function checkHoleTooSmall(context: RuleContext): readonly Finding[] {
  return context.document.layout.features.flatMap((feature) => checkFeature(context, feature));
}

function checkFeature(context: RuleContext, feature: Feature): readonly Finding[] {
  const thicknessMm = context.sheet.thicknessMm;
  const isHole = feature.kind === 'hole';
  const foundMm = isHole ? findHoleDiameterMm(feature.purpose) : feature.widthMm;
  if (foundMm === null) return [];
  const floorMm = isHole ? SMALLEST_CUT.smallestHoleMm : SMALLEST_CUT.smallestSlotMm;
  const requiredMm = Math.max(SMALLEST_CUT.overT * thicknessMm, floorMm);
  if (foundMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const isThinSteel = context.material?.family === 'steel' && thicknessMm <= SMALLEST_CUT.thinSteelUpToMm;
  const lowestMm = isThinSteel
    ? Math.max(SMALLEST_CUT.thinSteelOverT * thicknessMm, SMALLEST_CUT.smallestHoleMm)
    : requiredMm;
  const isBlocker = foundMm < lowestMm - LIMIT_SLACK_MM;
  const id = `holeTooSmall-${feature.id}`;
  const name = nameOf(context, feature.id);
  const what = isHole ? 'Hole' : 'Slot';
  const size = isHole ? `${formatDecimal(foundMm, 2)} mm across` : `${formatDecimal(foundMm, 2)} mm wide`;
  const wider = isHole ? growHole(feature, requiredMm) : growSlot(feature, requiredMm);
  const middle = isHole
    ? feature.centre
    : { x: (feature.from.x + feature.to.x) / 2, y: (feature.from.y + feature.to.y) / 2 };
  return [
    {
      id,
      rule: 'holeTooSmall',
      severity: isBlocker ? 'blocker' : 'caution',
      title: `${what} ${name} is ${isBlocker ? 'too small to cut' : 'small for the laser'}`,
      detail:
        `It is ${size}. Through ${formatDecimal(thicknessMm, 2)} mm a laser wants ${formatDecimal(requiredMm, 2)}` +
        (isBlocker
          ? '; below that the beam melts the rim.'
          : `; steel this thin can go down to ${formatDecimal(lowestMm, 2)}.`),
      foundMm,
      requiredMm,
      why: isHole ? SMALLEST_CUT.why : SMALLEST_CUT.slotWhy,
      ids: [feature.id],
      at: placeOfLayout(context, middle),
      advice:
        wider === null
          ? 'Mark its centre on the laser and drill it, or take a larger thread.'
          : 'Make it larger, or mark it on the laser and drill it afterwards.',
      mend:
        wider === null ? null : mendThatHolds(context, id, `Grow it to ${formatDecimal(requiredMm, 2)} mm`, [wider]),
    },
  ];
}

/** A threaded hole follows its fastener, so only holes with a size of their own can grow. */
function growHole(hole: HoleFeature, toMm: number): PartCommand | null {
  if (!('diameterMm' in hole.purpose)) return null;
  return { kind: 'setHolePurpose', featureId: hole.id, purpose: { ...hole.purpose, diameterMm: toMm } };
}

/** Widens a slot about its middle; its overall length grows by as much, so that it stays a slot. */
function growSlot(slot: SlotFeature, toMm: number): PartCommand {
  const lengthMm = distance(slot.from, slot.to) + toMm;
  return { kind: 'setSlotSize', featureId: slot.id, lengthMm, widthMm: toMm };
}
