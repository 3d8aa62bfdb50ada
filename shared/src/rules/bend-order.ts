import type { Development, Provenance } from '../bending/development';
import { findBendOrder } from '../brake/find-bend-order';
import type { BlockedBend, BendOrder } from '../brake/find-bend-order';
import type { BendStep } from '../brake/make-bend';
import { findSelfInterference } from '../brake/self-interference';
import { between } from '../geometry/vector';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { checkFlangeTooShort } from './flange-too-short';
import { plural } from './in-words';
import { pieceInWords } from './piece-in-words';
import { type RuleContext, listNames, nameOf, placeOfLayout } from './rule-context';

const WHY: Provenance = {
  text: 'each bend tried with a straight, a gooseneck and an acute punch, sectional, 120 mm from tip to ram, and the V-die of this sheet',
  source: 'common practice, no source',
  confidence: 'common-practice',
};

/** Tests of overlap for one check: about 50 ms at the most. */
const TEST_BUDGET = 200_000;

/**
 * Whether a press brake can make all bends, one after another: a hint with an order for who bends on an own brake, a blocker
 * that says what is in the way when there is none, a caution when the search was broken off.
 */
export function checkBendOrder(context: RuleContext, testBudget: number = TEST_BUDGET): readonly Finding[] {
  const { development, document } = context;
  if (development === null || development.bendTable.length === 0) return [];
  const order = findBendOrder(development, undefined, testBudget);
  if (order.ok) {
    const isWorthSaying = document.making.bender === 'own-brake' && order.order.length > 1;
    return isWorthSaying ? [proposed(context, order.order)] : [];
  }
  if (order.reason === 'budgetSpent') return [notWorkedOut(development)];
  // A part that cannot be at all is told by its own rule; no order would help it.
  if (findSelfInterference(development).length > 0) return [];
  return isToldAsShort(context, order) ? [] : [blocked(context, development, order.blockedBy)];
}

/** A flange that slips off the die is told with the length it needs. */
function isToldAsShort(context: RuleContext, { blockedBy }: BendOrder & { readonly ok: false }): boolean {
  if (!blockedBy.every(({ hindrance }) => hindrance.kind === 'slips')) return false;
  const short = checkFlangeTooShort({ ...context, tryOut: null }).flatMap(({ ids }) => ids);
  return blockedBy.every(({ bendId }) => short.includes(bendId));
}

function proposed(context: RuleContext, steps: readonly BendStep[]): Finding {
  const names = steps.map(({ bendId }) => nameOf(context, bendId));
  return {
    ...SAID_ONCE,
    severity: 'hint',
    title: `Bend in this order: ${names.join(', ')}`,
    detail: steps.map((step) => `${nameOf(context, step.bendId)} ${stepInWords(step)}`).join('; ') + '.',
    ids: steps.map(({ bendId }) => bendId),
    at: null,
    advice: 'Other orders may work too. Compare your own punches and dies with these before you start.',
  };
}

function stepInWords({ punchId, dieId, isTurnedOver, isPressedFlat }: BendStep): string {
  const flat = isPressedFlat ? ', then pressed flat' : '';
  return `with face ${isTurnedOver ? 'B' : 'A'} up, ${PUNCH_WORDS[punchId]} punch over ${dieId.toUpperCase()}${flat}`;
}

const PUNCH_WORDS: Readonly<Record<BendStep['punchId'], string>> = {
  straight: 'straight',
  gooseneck: 'gooseneck',
  acute: 'acute',
};

function blocked(context: RuleContext, development: Development, blockedBy: readonly BlockedBend[]): Finding {
  const [first] = blockedBy;
  const bend = context.document.layout.bends.find(({ id }) => id === first?.bendId);
  const names = blockedBy.map(({ bendId }) => nameOf(context, bendId));
  return {
    ...SAID_ONCE,
    severity: 'blocker',
    title:
      development.bendTable.length === 1
        ? `${listNames(names)} can’t be bent with usual tools`
        : `No order of bends works: ${listNames(names)} ${plural(names.length, 'is', 'are')} in the way`,
    detail: blockedBy.map((one) => hindranceInWords(context, development, one)).join(' '),
    ids: blockedBy.map(({ bendId }) => bendId),
    at: bend === undefined ? null : placeOfLayout(context, between(bend.line.from, bend.line.to, 0.5)),
    advice: 'Make a flange shorter or its panel wider, make it of two pieces, or ask a bender who has other punches.',
  };
}

function hindranceInWords(context: RuleContext, development: Development, { bendId, hindrance }: BlockedBend): string {
  const bend = nameOf(context, bendId);
  switch (hindrance.kind) {
    case 'hits': {
      const piece = pieceInWords(context, development, hindrance.piece);
      const into =
        hindrance.other === null
          ? OBSTACLE_WORDS[hindrance.obstacle]
          : pieceInWords(context, development, hindrance.other);
      return `${bend}: at ${formatDecimal(hindrance.atAngleDeg, 0)}° ${piece} runs into ${into}.`;
    }
    case 'slips':
      return (
        `${bend}: ${formatDecimal(hindrance.reachMm, 1)} mm of flat sheet lie over the die on one side; ` +
        `it takes ${formatDecimal(hindrance.requiredMm, 1)}.`
      );
    case 'outOfLine':
      return `${bend}: bends made before bring its stretches out of line.`;
    case 'noPunch':
      return `${bend}: there is no punch.`;
  }
}

const OBSTACLE_WORDS = {
  punch: 'the punch',
  die: 'the die',
  ram: 'the ram',
  bed: 'the bed',
  frames: 'the side frames',
  part: 'the part',
} as const;

function notWorkedOut({ bendTable }: Development): Finding {
  return {
    ...SAID_ONCE,
    severity: 'caution',
    title: 'No order of bends was found yet',
    detail: `With ${bendTable.length} bends there are too many orders to try in the time a check has.`,
    ids: bendTable.map(({ bendId }) => bendId),
    at: null,
    advice: 'Work the order out with the bender before you have the blank cut.',
  };
}

const SAID_ONCE = {
  id: 'bendOrder',
  rule: 'bendOrder',
  foundMm: null,
  requiredMm: null,
  why: WHY,
  mend: null,
} as const;
