import type { HoleFeature } from '../../bending/layout';
import type { Finding } from '../finding';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, placeOfLayout } from '../rule-context';
import { allCalled, finishOf } from './assembled-part';
import { MASK_WHY, PLATED_HARDWARE_WHY } from './limits';

/**
 * Threads tapped and nuts set before coating: powder has to be masked off both, a caution; baths only harm nuts of another metal,
 * which is worth knowing (what plating does to a tapped thread is told with its size).
 */
export function checkMaskedHardware(context: RuleContext): readonly Finding[] {
  const finish = finishOf(context);
  const { assembly, layout } = context.document;
  if (finish === null || assembly?.hardwareSet !== 'before-coating') return [];
  const isPowder = finish.process === 'powder';
  const holes = layout.features.filter(
    (feature): feature is HoleFeature =>
      feature.kind === 'hole' &&
      (feature.purpose.kind === 'rivet-nut' || (isPowder && feature.purpose.kind === 'tapped')),
  );
  const [first] = holes;
  if (first === undefined) return [];
  const ids = holes.map((hole) => hole.id);
  const id = 'hardwareNeedsMask';
  const who = allCalled(context, ids);
  return [
    {
      id,
      rule: 'hardwareNeedsMask',
      severity: isPowder ? 'caution' : 'hint',
      title: isPowder
        ? `${who} ${ids.length === 1 ? 'needs a mask' : 'need masks'}`
        : `Nuts of ${who} go through the bath`,
      detail: isPowder
        ? `Threads and nuts are set before coating. ${finish.name} fills them unless they are masked.`
        : `Nuts are set before the part is finished (${finish.name}). Baths attack nuts of another metal and stay under them.`,
      foundMm: null,
      requiredMm: null,
      why: isPowder ? MASK_WHY : PLATED_HARDWARE_WHY,
      ids,
      at: placeOfLayout(context, first.centre),
      advice: isPowder
        ? 'Set hardware after coating, or have plugs put into the threads.'
        : 'Set the nuts afterwards, or ask the coater which nuts stand the bath.',
      mend: mendThatHolds(context, id, 'Set hardware after coating', [
        { kind: 'setAssembly', assembly: { ...assembly, hardwareSet: 'after-coating' } },
      ]),
    },
  ];
}
