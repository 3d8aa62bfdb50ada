import type { Development, Relief } from '../bending/development';
import { formatDecimal } from '../units/length';
import { outlineEdgeOf } from './bend-front';
import { type DrawnRelief, drawnReliefs } from './drawn-relief';
import type { Finding, Mend } from './finding';
import { LIMIT_SLACK_MM, RELIEF } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, nameOf, placeOfFlat } from './rule-context';

/**
 * Where a bend ends beside sheet that stays flat, the sheet tears unless a relief lets it go: at least 1 T (and 1 mm)
 * wide, reaching R + T past the tangent line. Reports ends without a relief, and reliefs and drawn notches that are too small.
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
  return [...findings, ...checkDrawn(context, development)];
}

/** The same of notches that somebody drew and of openings across the bend, one finding for each bend. */
function checkDrawn(context: RuleContext, development: Development): readonly Finding[] {
  const { thicknessMm } = development.stock;
  const widthMm = Math.max(RELIEF.widthOverT * thicknessMm, RELIEF.smallestWidthMm);
  const drawn = drawnReliefs(development);
  return development.bendTable.flatMap((row): readonly Finding[] => {
    const depthMm = row.insideRadiusMm + thicknessMm;
    const notches = drawn.filter(({ bendId }) => bendId === row.bendId);
    const narrow = notches.find((notch) => notch.widthMm < widthMm - LIMIT_SLACK_MM);
    const shallow = notches.find((notch) => notch.depthMm < depthMm - LIMIT_SLACK_MM);
    const small = narrow ?? shallow;
    if (small === undefined) return [];
    const isNarrow = small === narrow;
    const [foundMm, requiredMm] = isNarrow ? [small.widthMm, widthMm] : [small.depthMm, depthMm];
    const id = `missingRelief-${row.bendId}-drawn`;
    const what = small.isAcross ? 'opening across' : 'notch at the end of';
    return [
      {
        id,
        rule: 'missingRelief',
        severity: 'caution',
        title: `The ${what} ${nameOf(context, row.bendId)} is too ${isNarrow ? 'narrow' : 'shallow'}`,
        detail:
          `It is ${formatDecimal(foundMm, 2)} mm ${isNarrow ? 'wide' : 'deep past the tangent line'}; this sheet and ` +
          `radius want ${formatDecimal(requiredMm, 2)}.`,
        foundMm,
        requiredMm,
        why: RELIEF.why,
        ids: [row.bendId],
        at: placeOfFlat(development, small.end),
        advice: isNarrow ? 'Draw it wider.' : 'Draw it deeper, past where the metal is bent.',
        mend: isNarrow ? null : deepen(context, id, small, requiredMm - foundMm),
      },
    ];
  });
}

/** Slides the straight bottom of a notch into the metal. */
function deepen(context: RuleContext, findingId: string, notch: DrawnRelief, missingMm: number): Mend | null {
  const { outer, cutouts } = context.document.layout;
  const edgeId = outlineEdgeOf([outer, ...cutouts], notch.front, notch.bottom);
  if (edgeId === null) return null;
  return mendThatHolds(context, findingId, `Make it ${formatDecimal(missingMm, 2)} mm deeper`, [
    { kind: 'slideEdge', edgeId, byMm: -missingMm },
  ]);
}

function finding(
  context: RuleContext,
  bendId: string,
  { layout, flat }: Relief,
  words: Pick<Finding, 'title' | 'detail' | 'foundMm' | 'requiredMm'>,
): Finding {
  const { reliefs } = context.document.layout;
  const id = `missingRelief-${bendId}`;
  return {
    id,
    rule: 'missingRelief',
    severity: 'caution',
    ...words,
    why: RELIEF.why,
    ids: [bendId],
    at: { layout, flat },
    advice: 'Let Foldwright cut the reliefs, or draw notches of your own at the ends of the bend.',
    mend: mendThatHolds(context, id, 'Cut reliefs by the rule', [
      { kind: 'setReliefs', reliefs: { ...reliefs, mode: 'automatic', widthMm: null, depthMm: null } },
    ]),
  };
}
