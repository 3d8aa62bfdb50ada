import type { BendRow } from '../bending/development';
import type { BendDeclaration } from '../bending/layout';
import { between } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import type { SheetStock } from '../part/part-document';
import { resolveStock } from '../stock/resolve-stock';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { plural } from './in-words';
import { DELIVERED_RADIUS, LIMIT_SLACK_MM } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { standsRadius } from './radius-below-minimum';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

/**
 * Asked radii against what the die delivers in this metal. An air bend follows the V opening, or a punch with a larger nose:
 * a smaller radius than the die's cannot be had over it (caution), a larger one needs such a punch (hint). Bends that ask
 * for the same radius are told together. Hems are pressed flat and have no die.
 */
export function checkDeliveredRadius(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  const { deliveredRadiusMm } = development.stock;
  const groups = new Map<string, BendRow[]>();
  for (const row of development.bendTable) {
    const differsMm = Math.abs(row.insideRadiusMm - deliveredRadiusMm);
    if (row.bendAngleDeg >= 180 || differsMm <= DELIVERED_RADIUS.withinMm + LIMIT_SLACK_MM) continue;
    const key = row.insideRadiusMm.toFixed(3);
    groups.set(key, [...(groups.get(key) ?? []), row]);
  }
  return [...groups.values()].flatMap((rows) => describe(context, rows, deliveredRadiusMm));
}

function describe(context: RuleContext, rows: readonly BendRow[], deliveredMm: number): readonly Finding[] {
  const { layout } = context.document;
  const bends = rows.flatMap(({ bendId }) => layout.bends.find(({ id }) => id === bendId) ?? []);
  const [first] = bends;
  const askedMm = rows[0]?.insideRadiusMm;
  const vOpeningMm = rows[0]?.vOpeningMm;
  if (first === undefined || askedMm === undefined || vOpeningMm === undefined) return [];
  const names = listSome(bends.map(({ id }) => nameOf(context, id)));
  const isSmaller = askedMm < deliveredMm;
  const mm = (valueMm: number) => formatDecimal(valueMm, 2);
  const id = `deliveredRadius-${bends.map((bend) => bend.id).join('-')}`;
  const commands = bends.map((bend): PartCommand => ({
    kind: 'changeBend',
    bendId: bend.id,
    bend: { ...bend, insideRadiusMm: null },
  }));
  const isEnough = Object.values(context.document.stocks).every((sheet) => isDeliveredEnough(sheet, bends));
  return [
    {
      id,
      rule: 'deliveredRadius',
      severity: isSmaller ? 'caution' : 'hint',
      title: isSmaller
        ? `The die bends ${names} rounder than asked`
        : `${names} ${plural(bends.length, 'needs', 'need')} a punch of ${mm(askedMm)} mm`,
      detail:
        `Asked for is an inside radius of ${mm(askedMm)} mm; the V ${formatDecimal(vOpeningMm, 1)} die delivers ` +
        `${mm(deliveredMm)} in this metal` +
        (isSmaller
          ? ', whatever punch is in it. The blank would come out too long for it.'
          : ' unless the punch’s nose is as large as asked.'),
      foundMm: askedMm,
      requiredMm: deliveredMm,
      why: DELIVERED_RADIUS.why,
      ids: bends.map((bend) => bend.id),
      at: placeOfLayout(context, between(first.line.from, first.line.to, 0.5)),
      advice: isSmaller
        ? 'Take the radius the die delivers, or a narrower die.'
        : 'Ask the shop for that punch, or take the radius the die delivers if the metal stands it.',
      mend: isEnough ? mendThatHolds(context, id, `Take ${mm(deliveredMm)} mm as delivered`, commands) : null,
    },
  ];
}

/** One declaration holds for both sheets, so each has to stand what its own die delivers. */
function isDeliveredEnough(sheet: SheetStock, bends: readonly BendDeclaration[]): boolean {
  const resolution = resolveStock(sheet);
  return resolution.ok && bends.every((bend) => standsRadius(sheet, bend, resolution.stock.deliveredRadiusMm));
}
