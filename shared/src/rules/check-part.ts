import type { DevelopmentProblem, DevelopmentResult } from '../bending/development';
import { applyCommands } from '../part/apply-command';
import { CommandRefusal } from '../part/command-refusal';
import type { PartCommand } from '../part/commands';
import { developPart } from '../part/develop-part';
import { entityNames } from '../part/entity-names';
import type { PartDocument, StockRole } from '../part/part-document';
import { findMaterial } from '../stock/materials';
import { ASSEMBLING_RULES } from './assembling/assembling-rules';
import { checkBoltsStart } from './assembling/bolts-start';
import { checkBendOrder } from './bend-order';
import { checkBlankOutOfRange } from './blank-out-of-range';
import { checkBrakeTooSmall } from './brake-too-small';
import { checkCannotBeDeveloped } from './cannot-be-developed';
import { checkDeclaredUse } from './declared-use';
import { checkDeliveredRadius } from './delivered-radius';
import { checkDieOpening } from './die-opening';
import { checkDrawnTwice } from './drawn-twice';
import { checkEdgeInBendZone } from './edge-in-bend-zone';
import { checkEtchedText } from './etched-text';
import type { Finding, Severity } from './finding';
import { checkFlangeTooShort } from './flange-too-short';
import { checkHoleInBendZone } from './hole-in-bend-zone';
import { checkHoleTooSmall } from './hole-too-small';
import { checkInsideCorner } from './inside-corner';
import { checkLandTooThin } from './land-too-thin';
import { checkMissingRelief } from './missing-relief';
import { checkOutlineCrossesItself } from './outline-crosses-itself';
import { checkPieceDropsOut } from './piece-drops-out';
import { checkRadiusBelowMinimum } from './radius-below-minimum';
import type { RuleContext, TryOut } from './rule-context';
import { checkSeatCorner } from './seat-corner';
import { checkSelfInterference } from './self-interference';
import { checkTinyEdge } from './tiny-edge';
import { checkUnitsSlip } from './units-slip';
import { checkWrongHand } from './wrong-hand';

/** Version of the rules and their limits; a release keeps it. Raised whenever a rule answers differently. */
export const RULES_VERSION = 3;

type Rule = (context: RuleContext) => readonly Finding[];

/** Rules about outline, flat pattern and bends alone. They are quick, and mends are tried on them. */
const PLAIN_RULES: readonly Rule[] = [
  checkUnitsSlip,
  checkOutlineCrossesItself,
  checkDrawnTwice,
  checkTinyEdge,
  checkFlangeTooShort,
  checkHoleInBendZone,
  checkEdgeInBendZone,
  checkMissingRelief,
  checkRadiusBelowMinimum,
  checkDeliveredRadius,
  checkDieOpening,
  checkBrakeTooSmall,
  checkBlankOutOfRange,
  checkHoleTooSmall,
  checkLandTooThin,
  checkPieceDropsOut,
  checkInsideCorner,
  checkEtchedText,
  checkSeatCorner,
  checkWrongHand,
  ...ASSEMBLING_RULES,
  checkSelfInterference,
];

const RULES: readonly Rule[] = [
  ...PLAIN_RULES,
  (context) => checkBendOrder(context),
  checkBoltsStart,
  checkDeclaredUse,
];

/**
 * All checks of a part in one of its sheets, worst first.
 * @returns findings; empty when nothing was found, which is no statement about strength or use
 */
export function checkPart(document: PartDocument, role: StockRole): readonly Finding[] {
  return checkDevelopedPart(document, role, developPart(document, role));
}

/**
 * The same for a caller that has developed the part already. `result` belongs to this document and role.
 * @param mends `left out` is several times as quick, for a drawing that a hand is moving right now
 */
export function checkDevelopedPart(
  document: PartDocument,
  role: StockRole,
  result: DevelopmentResult,
  mends: 'offered' | 'left out' = 'offered',
): readonly Finding[] {
  const context = contextOf(document, role, result);
  const tryOut = mends === 'offered' ? tryOutOn(context, result) : null;
  const findings = findWith(RULES, { ...context, tryOut });
  return [...findings].sort((a, b) => RANK[a.severity] - RANK[b.severity]);
}

const RANK: Readonly<Record<Severity, number>> = { blocker: 0, caution: 1, hint: 2 };

function contextOf(document: PartDocument, role: StockRole, result: DevelopmentResult): RuleContext {
  const sheet = document.stocks[role];
  return {
    document,
    role,
    sheet,
    material: findMaterial(sheet.materialId),
    names: entityNames(document.layout),
    development: result.ok ? result.development : null,
    problems: result.ok ? [] : result.problems,
    tryOut: null,
  };
}

function findWith(rules: readonly Rule[], context: RuleContext): readonly Finding[] {
  const found = rules.flatMap((check) => check(context));
  return [...found, ...checkCannotBeDeveloped(context, (problem) => isTold(problem, found))];
}

/**
 * Mends are compared with the findings of the document as it is, which are looked for once and only when needed. How many are
 * tried depends on the size of the document alone, so that everybody is offered the same ones and nobody waits for them.
 */
function tryOutOn(context: RuleContext, result: DevelopmentResult): TryOut {
  const { outer, cutouts, features } = context.document.layout;
  const size = [outer, ...cutouts].reduce((sum, { edges }) => sum + edges.length, features.length);
  let triesLeft = Math.min(MOST_TRIES, Math.floor(THINGS_TRIED / Math.max(1, size)));
  let known: ReadonlySet<string> | null = null;
  let hadNoBendOrder: boolean | null = null;
  return (commands) => {
    const document = triesLeft > 0 ? applied(context.document, commands) : null;
    if (document === null) return null;
    triesLeft -= 1;
    known ??= blockerIds(findWith(PLAIN_RULES, context));
    const before = known;
    const isSameSheet = (['layout', 'template', 'stocks'] as const).every(
      (part) => document[part] === context.document[part],
    );
    const tried = isSameSheet ? result : developPart(document, context.role);
    const after = findWith(PLAIN_RULES, contextOf(document, context.role, tried));
    return {
      findingIds: new Set(after.map(({ id }) => id)),
      addsBlocker:
        [...blockerIds(after)].some((id) => !before.has(id)) ||
        (changesBends(context.document, document) &&
          hasNoBendOrder(contextOf(document, context.role, tried)) &&
          !(hadNoBendOrder ??= hasNoBendOrder(context))),
    };
  };
}

/** Whether an order of bends has to be looked for anew, which takes two milliseconds for six bends: holes and slots leave it be. */
function changesBends(before: PartDocument, after: PartDocument): boolean {
  if (before.stocks !== after.stocks || before.template !== after.template) return true;
  return (['outer', 'cutouts', 'bends', 'reliefs'] as const).some((part) => before.layout[part] !== after.layout[part]);
}

function hasNoBendOrder(context: RuleContext): boolean {
  return blockerIds(checkBendOrder(context)).size > 0;
}

/** Edges, holes and slots that all tries of one check may look at together: under half a second of work. */
const THINGS_TRIED = 2000;
const MOST_TRIES = 16;

function applied(document: PartDocument, commands: readonly PartCommand[]): PartDocument | null {
  try {
    return applyCommands(document, commands);
  } catch (error) {
    if (error instanceof CommandRefusal) return null;
    throw error;
  }
}

function blockerIds(findings: readonly Finding[]): ReadonlySet<string> {
  return new Set(findings.filter(({ severity }) => severity === 'blocker').map(({ id }) => id));
}

/** A bad outline and things drawn twice are told by the rules that show where. */
function isTold({ code, ids }: DevelopmentProblem, findings: readonly Finding[]): boolean {
  const blockers = findings.filter(({ severity }) => severity === 'blocker');
  const twice = blockers.filter(({ rule }) => rule === 'drawnTwice').flatMap((finding) => finding.ids);
  if (ids.length > 0 && ids.every((id) => twice.includes(id))) return true;
  const isOfOutline = blockers.some(({ rule }) => rule === 'outlineCrossesItself' || rule === 'landTooThin');
  return code === 'outlineNotSimple' && (isOfOutline || twice.length > 0);
}
