import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { DIE_OPENING, LIMIT_SLACK_MM } from './limits';
import { mendThatHolds } from './mend-that-holds';
import type { RuleContext } from './rule-context';

/**
 * A V opening that somebody named, against 6 to 12 T. Narrower marks the sheet and takes much more force: a caution. Wider
 * bends a larger radius and needs longer flanges: a hint. Openings of the table are not judged, nor sheets without bends.
 */
export function checkDieOpening(context: RuleContext): readonly Finding[] {
  const { sheet, document, role } = context;
  const { vOpeningMm, thicknessMm } = sheet;
  if (vOpeningMm === null || document.layout.bends.length === 0) return [];
  const lowestMm = DIE_OPENING.lowestOverT * thicknessMm;
  const highestMm = DIE_OPENING.highestOverT * thicknessMm;
  const isNarrow = vOpeningMm < lowestMm - LIMIT_SLACK_MM;
  if (!isNarrow && vOpeningMm <= highestMm + LIMIT_SLACK_MM) return [];
  const mm = (valueMm: number) => formatDecimal(valueMm, 1);
  const id = 'dieOpeningUnusual';
  return [
    {
      id,
      rule: 'dieOpeningUnusual',
      severity: isNarrow ? 'caution' : 'hint',
      title: `The V ${mm(vOpeningMm)} die is ${isNarrow ? 'narrow' : 'wide'} for this sheet`,
      detail: isNarrow
        ? `At ${formatDecimal(thicknessMm, 2)} mm thick it is ${mm(vOpeningMm / thicknessMm)} T wide. Below ` +
          `${mm(lowestMm)} its edges mark the sheet and the force climbs.`
        : `At ${formatDecimal(thicknessMm, 2)} mm thick it is ${mm(vOpeningMm / thicknessMm)} T wide. Above ` +
          `${mm(highestMm)} the angle wanders and flanges have to be long.`,
      foundMm: vOpeningMm,
      requiredMm: isNarrow ? lowestMm : highestMm,
      why: DIE_OPENING.why,
      ids: [],
      at: null,
      advice: 'Take a die between 6 and 12 T, or leave the choice to the table.',
      mend: mendThatHolds(context, id, 'Take the usual die', [
        { kind: 'setStock', role, stock: { ...sheet, vOpeningMm: null } },
      ]),
    },
  ];
}
