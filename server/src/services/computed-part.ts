import { createHash } from 'node:crypto';
import type { Development } from '@foldwright/shared/bending/development';
import type { ComputedPart } from '@foldwright/shared/contracts/development-schema';
import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { RULES_VERSION, checkDevelopedPart } from '@foldwright/shared/rules/check-part';
import type { Finding, Severity } from '@foldwright/shared/rules/finding';
import { METRIC_FASTENERS } from '@foldwright/shared/stock/fastener-tables';
import { GAUGE_TABLE } from '@foldwright/shared/stock/gauges';
import { LASER_KERF } from '@foldwright/shared/stock/laser-kerf';
import { SHEET_MATERIALS, findMaterial } from '@foldwright/shared/stock/materials';
import { V_DIE_CHART } from '@foldwright/shared/stock/v-dies';
import { formatDecimal } from '@foldwright/shared/units/length';
import * as z from 'zod/mini';

/** Rules in force, as a release records them. */
export const rulesVersion = String(RULES_VERSION);

/** Tables in force: a hash of their content, so that it changes with every figure and nobody has to remember to. */
export const tablesVersion = createHash('sha256')
  .update(JSON.stringify([SHEET_MATERIALS, V_DIE_CHART, METRIC_FASTENERS, GAUGE_TABLE, LASER_KERF], sayInfinity))
  .digest('hex')
  .slice(0, 16);

/** Open ends of table rows are infinite, which JSON can't say. */
function sayInfinity(_name: string, value: unknown): unknown {
  return typeof value === 'number' && !Number.isFinite(value) ? String(value) : value;
}

/** A part computed for one of its sheets: what goes to the page, and the whole development for documents. */
export interface Computation {
  readonly computed: ComputedPart;
  readonly development: Development | null;
  readonly findings: readonly Finding[];
}

/** "5052-H32, 3 mm": the sheet as people say it. */
export function stockLabel(document: PartDocument, role: StockRole): string {
  const { materialId, thicknessMm } = document.stocks[role];
  return `${findMaterial(materialId)?.name ?? materialId}, ${formatDecimal(thicknessMm, 2)} mm`;
}

export function computePart(document: PartDocument, role: StockRole): Computation {
  const result = developPart(document, role);
  const findings = checkDevelopedPart(document, role, result);
  const development = result.ok ? result.development : null;
  // The schema keeps what the wire carries and drops the rest (panels, zones), so that stored and sent are the same.
  const computed = z.parse(computedPartSchema, { role, stockLabel: stockLabel(document, role), development, findings });
  return { computed, development, findings };
}

export interface PartComputations {
  readonly trial: Computation;
  readonly production: Computation;
}

export const computeBothStocks = (document: PartDocument): PartComputations => ({
  trial: computePart(document, 'trial'),
  production: computePart(document, 'production'),
});

/** How many findings there are of each severity, counting one that both sheets have once. */
export function countFindings({ trial, production }: PartComputations): Record<`${Severity}s`, number> {
  const distinct = new Map([...trial.findings, ...production.findings].map((finding) => [finding.id, finding]));
  const count = (severity: Severity) => [...distinct.values()].filter((one) => one.severity === severity).length;
  return { blockers: count('blocker'), cautions: count('caution'), hints: count('hint') };
}
