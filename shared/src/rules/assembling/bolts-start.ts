import { chanceOf, formParts } from '../../assembly/bolt-chance';
import type { FormedParts } from '../../assembly/bolt-chance';
import { PatternError, patternModel } from '../../assembly/bolt-pattern';
import { proposeSlot } from '../../assembly/propose-slot';
import type { ProposedSlot } from '../../assembly/propose-slot';
import type { Development } from '../../bending/development';
import type { Feature } from '../../bending/layout';
import { STANDARD_BRAKE } from '../../bending/leg-gains';
import type { BoltsToMeet } from '../../part/assembly';
import { applyCommands } from '../../part/apply-command';
import type { PartCommand } from '../../part/commands';
import { developPart } from '../../part/develop-part';
import { type CoatSpread, NO_COAT } from '../../spread/causes';
import { formatDecimal } from '../../units/length';
import type { Finding } from '../finding';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, nameOf, placeOfLayout } from '../rule-context';
import { allCalled, boltDiameterMm, finishOf, middleOf } from './assembled-part';
import { BOLTS_WHY } from './limits';

/** Parts that are formed; and the seed, so that everybody is told the same. */
export const BOLT_SAMPLES = { count: 2000, seed: 20260 } as const;

/**
 * Will every bolt start? The chance that all bolts of `assembly.bolts` enter together, over parts that came off the brake as parts do,
 * before and after coating. Below what was wanted it is a caution; its mend is the shortest slot that reaches it.
 */
export function checkBoltsStart(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  const bolts = document.assembly?.bolts ?? null;
  if (development === null || bolts === null) return [];
  const features = bolts.featureIds.flatMap((id) => document.layout.features.find((one) => one.id === id) ?? []);
  const unread = features.filter((feature) => boltDiameterMm(feature) === null);
  if (features.length === 0) return [];
  if (unread.length > 0) {
    const who = allCalled(
      context,
      unread.map(({ id }) => id),
    );
    return [notJudged(context, unread, `${who} ${unread.length === 1 ? 'has' : 'have'} no bolt through`)];
  }
  const coat = coatOf(context);
  const parts = formed(development, bolts, features, coat);
  if (parts === null) {
    return [notJudged(context, features, 'Bolts that face different ways cannot be judged as one set')];
  }
  const coated = chanceOf(parts, true);
  if (coated.chance >= bolts.wantedChance) return [];
  const bare = coat === NO_COAT ? coated : chanceOf(parts, false);
  const proposal = context.tryOut === null ? null : proposeSlot(parts, bolts.wantedChance);
  const [first] = features;
  const id = 'boltsStart';
  const best = proposal?.kind === 'notEnough' ? proposal.best : null;
  return [
    {
      id,
      rule: 'boltsStart',
      severity: 'caution',
      title: `Bolts may not all start: ${percent(coated.chance)}`,
      detail:
        `Of 100 parts ${share(coated.chance)} go over all ${String(features.length)} bolts` +
        (coat === NO_COAT ? '' : ` once coated, ${share(bare.chance)} before`) +
        `; wanted are ${share(bolts.wantedChance)}.`,
      foundMm: null,
      requiredMm: null,
      why: BOLTS_WHY,
      ids: features.map((feature) => feature.id),
      at: first === undefined ? null : placeOfLayout(context, middleOf(first)),
      advice:
        best === null
          ? 'Slot one hole across the bends, take a coarser fit, or drill the last hole in place.'
          : `One slot is not enough: ${formatDecimal(best.lengthMm, 1)} mm in ${nameOf(context, best.featureId)} makes it ` +
            `${percent(best.chance.chance)}. Slot two, take a coarser fit, or drill in place.`,
      mend: proposal?.kind === 'slot' ? slotMend(context, id, proposal.slot) : null,
    },
  ];
}

function coatOf(context: RuleContext): CoatSpread {
  const finish = finishOf(context);
  if (finish === null) return NO_COAT;
  return { lowMm: finish.buildUpPerSideMm.low, highMm: finish.buildUpPerSideMm.high };
}

function formed(
  development: Development,
  { placeHalfWidthMm }: BoltsToMeet,
  features: readonly Feature[],
  coat: CoatSpread,
): FormedParts | null {
  const pattern = {
    bolts: features.map((feature) => ({ featureId: feature.id, boltMm: boltDiameterMm(feature) ?? 0, at: null })),
    placeHalfWidthMm,
  };
  try {
    const model = patternModel(development, { brake: STANDARD_BRAKE, coat, gauging: new Map() }, pattern);
    return formParts(model, coat, BOLT_SAMPLES.seed, BOLT_SAMPLES.count);
  } catch (error) {
    if (error instanceof PatternError) return null;
    throw error;
  }
}

/** The slot in place of its hole, under the same id, so that the bolts still go through it. */
function slotMend(context: RuleContext, findingId: string, slot: ProposedSlot): Finding['mend'] {
  const { featureId, from, to, widthMm, lengthMm } = slot;
  const commands: readonly PartCommand[] = [
    { kind: 'removeFeature', featureId },
    { kind: 'addFeature', feature: { kind: 'slot', id: featureId, from, to, widthMm } },
  ];
  const label = `Slot ${nameOf(context, featureId)} by ${formatDecimal(lengthMm, 1)} mm: ${percent(slot.chance.chance)}`;
  const mend = mendThatHolds(context, findingId, label, commands);
  return mend !== null && startsAfter(context, commands) ? mend : null;
}

/** Whether nothing is left to say of the bolts: mends are tried on quicker rules only, so this one looks for itself. */
function startsAfter(context: RuleContext, commands: readonly PartCommand[]): boolean {
  const document = applyCommands(context.document, commands);
  const result = developPart(document, context.role);
  if (!result.ok) return false;
  return checkBoltsStart({ ...context, document, development: result.development, tryOut: null }).length === 0;
}

function notJudged(context: RuleContext, features: readonly Feature[], title: string): Finding {
  const [first] = features;
  return {
    id: 'boltsStart',
    rule: 'boltsStart',
    severity: 'hint',
    title,
    detail: 'Whether all bolts start was not looked at.',
    foundMm: null,
    requiredMm: null,
    why: BOLTS_WHY,
    ids: features.map(({ id }) => id),
    at: first === undefined ? null : placeOfLayout(context, middleOf(first)),
    advice: 'Name holes that bolts go through and that lie on panels facing the same way, off the bends.',
    mend: null,
  };
}

/** A chance in whole percent, never rounded up to certainty. */
function share(chance: number): string {
  return formatDecimal(Math.floor(chance * 1000) / 10, 1);
}

function percent(chance: number): string {
  return `${share(chance)} %`;
}
