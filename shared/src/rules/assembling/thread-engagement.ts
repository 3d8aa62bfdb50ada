import type { Feature, HolePurpose } from '../../bending/layout';
import { findHoleDiameterMm } from '../../stock/hole-diameter';
import { threadDiameterMm, threadPitchMm } from '../../stock/thread-size';
import { formatDecimal } from '../../units/length';
import type { Finding } from '../finding';
import { LIMIT_SLACK_MM } from '../limits';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, nameOf, placeOfLayout } from '../rule-context';
import { ENGAGEMENT } from './limits';

/**
 * Threads tapped into sheet: fewer than two full turns are a caution, less than half a diameter (a whole one in soft metals) is worth
 * knowing. The sheet's thickness is all the thread there is.
 */
export function checkThreadEngagement(context: RuleContext): readonly Finding[] {
  return context.document.layout.features.flatMap((feature) => checkThread(context, feature));
}

const HARD: ReadonlySet<string> = new Set(['steel', 'stainless', 'other']);

function checkThread(context: RuleContext, feature: Feature): readonly Finding[] {
  if (feature.kind !== 'hole' || feature.purpose.kind !== 'tapped') return [];
  const { thread } = feature.purpose;
  const [diameterMm, pitchMm] = [threadDiameterMm(thread), threadPitchMm(thread)];
  if (diameterMm === null || pitchMm === null) return [];
  const foundMm = context.sheet.thicknessMm;
  const isHard = HARD.has(context.material?.family ?? 'steel');
  const turnsMm = ENGAGEMENT.fullTurns * pitchMm;
  const deepMm = (isHard ? ENGAGEMENT.overDiameter : ENGAGEMENT.softOverDiameter) * diameterMm;
  const requiredMm = Math.max(turnsMm, deepMm);
  if (foundMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const isShort = foundMm < turnsMm - LIMIT_SLACK_MM;
  const id = `threadTooShort-${feature.id}`;
  const name = nameOf(context, feature.id);
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const nut: HolePurpose = { kind: 'rivet-nut', thread };
  const hasNut = findHoleDiameterMm(nut) !== null;
  return [
    {
      id,
      rule: 'threadTooShort',
      severity: isShort ? 'caution' : 'hint',
      title: isShort ? `Thread ${name} has too few turns` : `Thread ${name} is short`,
      detail:
        `${thread} in ${mm(foundMm)} mm of sheet has ${formatDecimal(foundMm / pitchMm, 1)} turns. ` +
        (isShort
          ? `Two full turns take ${mm(turnsMm)} mm.`
          : `${isHard ? 'Half a' : 'In soft metal a whole'} diameter is ${mm(deepMm)} mm.`),
      foundMm,
      requiredMm: isShort ? turnsMm : requiredMm,
      why: ENGAGEMENT.why,
      ids: [feature.id],
      at: placeOfLayout(context, feature.centre),
      advice: hasNut
        ? 'Set a rivet nut, press in a nut, or put a nut behind it.'
        : 'Press in a nut, weld one on, or put a nut behind it.',
      mend: hasNut
        ? mendThatHolds(context, id, `Make it a hole for an ${thread} rivet nut`, [
            { kind: 'setHolePurpose', featureId: feature.id, purpose: nut },
          ])
        : null,
    },
  ];
}
