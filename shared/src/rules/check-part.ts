import type { DevelopmentProblem, DevelopmentResult } from '../bending/development';
import { developPart } from '../part/develop-part';
import { entityNames } from '../part/entity-names';
import type { PartDocument, StockRole } from '../part/part-document';
import { findMaterial } from '../stock/materials';
import { checkCannotBeDeveloped } from './cannot-be-developed';
import { checkDeclaredUse } from './declared-use';
import type { Finding, Severity } from './finding';
import { checkFlangeTooShort } from './flange-too-short';
import { checkHoleInBendZone } from './hole-in-bend-zone';
import { checkHoleTooSmall } from './hole-too-small';
import { checkLandTooThin } from './land-too-thin';
import { checkMissingRelief } from './missing-relief';
import { checkOutlineCrossesItself } from './outline-crosses-itself';
import { checkRadiusBelowMinimum } from './radius-below-minimum';
import type { RuleContext } from './rule-context';

/** Version of the rules and their limits; a release keeps it. Raised whenever a rule answers differently. */
export const RULES_VERSION = 1;

const RULES = [
  checkOutlineCrossesItself,
  checkFlangeTooShort,
  checkHoleInBendZone,
  checkMissingRelief,
  checkRadiusBelowMinimum,
  checkHoleTooSmall,
  checkLandTooThin,
  checkDeclaredUse,
] as const;

/**
 * All checks of a part in one of its sheets, worst first.
 * @returns findings; empty when nothing was found, which is no statement about strength or use
 */
export function checkPart(document: PartDocument, role: StockRole): readonly Finding[] {
  return checkDevelopedPart(document, role, developPart(document, role));
}

/** The same for a caller that has developed the part already. `result` belongs to this document and role. */
export function checkDevelopedPart(
  document: PartDocument,
  role: StockRole,
  result: DevelopmentResult,
): readonly Finding[] {
  const sheet = document.stocks[role];
  const context: RuleContext = {
    document,
    role,
    sheet,
    material: findMaterial(sheet.materialId),
    names: entityNames(document.layout),
    development: result.ok ? result.development : null,
    problems: result.ok ? [] : result.problems,
  };
  const found = RULES.flatMap((check) => check(context));
  const findings = [...found, ...checkCannotBeDeveloped(context, toldAlready(found))];
  return findings.sort((a, b) => RANK[a.severity] - RANK[b.severity]);
}

const RANK: Readonly<Record<Severity, number>> = { blocker: 0, caution: 1, hint: 2 };

/** A bad outline is told by the rules that show where: crossing edges, or an opening over the edge. */
function toldAlready(findings: readonly Finding[]): ReadonlySet<DevelopmentProblem['code']> {
  const isTold = findings.some(
    ({ rule, severity }) => severity === 'blocker' && (rule === 'outlineCrossesItself' || rule === 'landTooThin'),
  );
  return new Set(isTold ? (['outlineNotSimple'] as const) : []);
}
