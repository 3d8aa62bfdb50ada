import type { Finding } from '../finding';
import { mendThatHolds } from '../mend-that-holds';
import type { RuleContext } from '../rule-context';
import { finishOf } from './assembled-part';
import { FINISH_WHY } from './limits';

/** A finish that the production sheet's metal does not take: zinc on anything but steel, anodising on anything but aluminium. */
export function checkFinishForMetal(context: RuleContext): readonly Finding[] {
  const finish = finishOf(context);
  const { material } = context;
  const { assembly } = context.document;
  if (finish?.familyOnly == null || material === null || assembly === undefined) return [];
  if (material.family === finish.familyOnly) return [];
  const id = 'finishNotForMetal';
  return [
    {
      id,
      rule: 'finishNotForMetal',
      severity: 'blocker',
      title: `${finish.name} is not for ${material.shortName}`,
      detail: `${finish.name} is for ${finish.familyOnly}; the production sheet is ${material.name}.`,
      foundMm: null,
      requiredMm: null,
      why: FINISH_WHY,
      ids: [],
      at: null,
      advice: 'Choose a finish that this metal takes, powder for one, or another sheet.',
      mend: mendThatHolds(context, id, 'Leave it bare', [
        { kind: 'setAssembly', assembly: { ...assembly, finishId: 'bare' } },
      ]),
    },
  ];
}
