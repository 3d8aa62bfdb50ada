import type { Relief } from '../bending/development';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { LIMIT_SLACK_MM, RELIEF } from './limits';
import { type RuleContext, nameOf } from './rule-context';

/**
 * Where a bend ends beside sheet that stays flat, the sheet tears unless a relief lets it go: at least 1 T (and 1 mm)
 * wide, reaching R + T past the tangent line. Reports ends without a relief and reliefs that are too small.
 */
export function checkMissingRelief(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  const findings: Finding[] = [];
  for (const row of development.bendTable) {
    const ends = development.reliefs.filter((relief) => relief.bendId === row.bendId);
    const missing = ends.filter((relief) => relief.state === 'missing');
    const [first] = missing;
    const name = nameOf(context, row.bendId);
    const { thicknessMm } = development.stock;
    const widthMm = Math.max(RELIEF.widthOverT * thicknessMm, RELIEF.smallestWidthMm);
    const depthMm = row.insideRadiusMm + thicknessMm;
    if (first !== undefined) {
      findings.push(
        finding(context, row.bendId, first, {
          title: `${name} has no relief at ${missing.length > 1 ? `${missing.length} ends` : 'one end'}`,
          detail:
            `The flange is narrower than the panel it stands on. Without a slit of ${formatDecimal(widthMm, 1)} mm ` +
            `beside it, ${formatDecimal(depthMm, 1)} past the tangent line, the sheet tears at the corner.`,
          foundMm: 0,
          requiredMm: widthMm,
        }),
      );
    }
    const narrow = ends.find((relief) => relief.state === 'added' && relief.widthMm < widthMm - LIMIT_SLACK_MM);
    const shallow = ends.find((relief) => relief.state === 'added' && relief.depthMm < depthMm - LIMIT_SLACK_MM);
    const small = narrow ?? shallow;
    if (small !== undefined) {
      const [word, foundMm, requiredMm] =
        small === narrow
          ? (['narrow', small.widthMm, widthMm] as const)
          : (['shallow', small.depthMm, depthMm] as const);
      findings.push(
        finding(context, row.bendId, small, {
          title: `The reliefs at ${name} are too ${word}`,
          detail:
            `They are ${formatDecimal(foundMm, 2)} mm ${word === 'narrow' ? 'wide' : 'deep past the tangent line'}; ` +
            `this sheet and radius want ${formatDecimal(requiredMm, 2)}.`,
          foundMm,
          requiredMm,
        }),
      );
    }
  }
  return findings;
}

function finding(
  context: RuleContext,
  bendId: string,
  { layout, flat }: Relief,
  words: Pick<Finding, 'title' | 'detail' | 'foundMm' | 'requiredMm'>,
): Finding {
  const { reliefs } = context.document.layout;
  return {
    id: `missingRelief-${bendId}`,
    rule: 'missingRelief',
    severity: 'caution',
    ...words,
    why: RELIEF.why,
    ids: [bendId],
    at: { layout, flat },
    advice: 'Let Foldwright cut the reliefs, or draw notches of your own at the ends of the bend.',
    mend: {
      label: 'Cut reliefs by the rule',
      commands: [{ kind: 'setReliefs', reliefs: { ...reliefs, mode: 'automatic', widthMm: null, depthMm: null } }],
    },
  };
}
