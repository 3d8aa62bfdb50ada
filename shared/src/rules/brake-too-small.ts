import type { BendRow, Development } from '../bending/development';
import type { BendDeclaration } from '../bending/layout';
import { bendForceKn } from '../bending/bend-force';
import { between, dot } from '../geometry/vector';
import { V_DIE_CHART } from '../stock/v-dies';
import { formatDecimal } from '../units/length';
import type { Finding, Mend } from './finding';
import { BRAKE, DIE_OPENING, LIMIT_SLACK_MM } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, nameOf, placeOfLayout } from './rule-context';

/** Length and force of each bend against a usual press brake. Cautions: a larger brake may be at hand. */
export function checkBrakeTooSmall(context: RuleContext): readonly Finding[] {
  const { development, document } = context;
  if (development === null) return [];
  return development.bendTable.flatMap((row) => {
    const bend = document.layout.bends.find(({ id }) => id === row.bendId);
    if (bend === undefined) return [];
    return [...checkLength(context, development, row, bend), ...checkForce(context, development, row, bend)];
  });
}

function checkLength(
  context: RuleContext,
  development: Development,
  row: BendRow,
  bend: BendDeclaration,
): readonly Finding[] {
  const lengthMm = spanMm(development, row.bendId);
  if (lengthMm <= BRAKE.lengthMm + LIMIT_SLACK_MM) return [];
  return [
    {
      id: `brakeTooSmall-${row.bendId}-length`,
      rule: 'brakeTooSmall',
      severity: 'caution',
      title: `${nameOf(context, row.bendId)} is longer than a usual brake`,
      detail: `It is ${formatDecimal(lengthMm, 1)} mm long; a usual press brake takes ${BRAKE.lengthMm}.`,
      foundMm: lengthMm,
      requiredMm: BRAKE.lengthMm,
      why: BRAKE.why,
      ids: [row.bendId],
      at: placeOfLayout(context, between(bend.line.from, bend.line.to, 0.5)),
      advice: 'Ask for a shop with a longer brake, or make the part of two pieces.',
      mend: null,
    },
  ];
}

/** From the first to the last end of a bend along its line, openings between counted in, mm. */
function spanMm({ flat, zones }: Development, bendId: string): number {
  const direction = zones.find((zone) => zone.bendId === bendId)?.along;
  if (direction === undefined) return 0;
  const ends = flat.bends
    .filter((bend) => bend.bendId === bendId)
    .flatMap(({ centreLines }) => centreLines.flatMap(({ from, to }) => [dot(from, direction), dot(to, direction)]));
  return ends.length === 0 ? 0 : Math.max(...ends) - Math.min(...ends);
}

function checkForce(
  context: RuleContext,
  development: Development,
  row: BendRow,
  bend: BendDeclaration,
): readonly Finding[] {
  if (row.forceKn <= BRAKE.forceKn + LIMIT_SLACK_MM) return [];
  const kn = (force: number) => formatDecimal(force, 0);
  const id = `brakeTooSmall-${row.bendId}-force`;
  return [
    {
      id,
      rule: 'brakeTooSmall',
      severity: 'caution',
      title: `${nameOf(context, row.bendId)} takes more force than a usual brake has`,
      detail:
        `Over the V ${formatDecimal(row.vOpeningMm, 1)} die it takes about ${kn(row.forceKn)} kN on ` +
        `${formatDecimal(row.bendLengthMm, 0)} mm; a usual press brake has ${kn(BRAKE.forceKn)}.`,
      foundMm: null,
      requiredMm: null,
      why: BRAKE.forceWhy,
      ids: [row.bendId],
      at: placeOfLayout(context, between(bend.line.from, bend.line.to, 0.5)),
      advice: 'Take a wider die if the flanges allow it, a thinner sheet, or ask for a stronger brake.',
      mend: widerDie(context, development, row, id),
    },
  ];
}

/** The next die of the chart that brings the force down, as long as it is no wider than shops bend over. */
function widerDie(context: RuleContext, { stock }: Development, row: BendRow, findingId: string): Mend | null {
  const { sheet, role } = context;
  const die = V_DIE_CHART.find(({ openingMm }) => {
    const forceKn = bendForceKn({ ...stock, bendLengthMm: row.bendLengthMm, vOpeningMm: openingMm });
    return openingMm > stock.vOpeningMm && forceKn <= BRAKE.forceKn;
  });
  if (die === undefined || die.openingMm > DIE_OPENING.highestOverT * stock.thicknessMm) return null;
  return mendThatHolds(context, findingId, `Take the V ${formatDecimal(die.openingMm, 1)} die`, [
    { kind: 'setStock', role, stock: { ...sheet, vOpeningMm: die.openingMm } },
  ]);
}
