import type { BendZone, Development } from '../bending/development';
import { makeBend } from './make-bend';
import type { BendStep, Hindrance, Tooling } from './make-bend';
import { layOutPlates } from './plates';
import type { TestBudget } from './plates';
import { PUNCHES } from './tooling';

/** Why a bend could not be made in the state in which it came farthest. */
export interface BlockedBend {
  readonly bendId: string;
  readonly hindrance: Hindrance;
}

export type BendOrder =
  | { readonly ok: true; readonly order: readonly BendStep[]; readonly testsSpent: number }
  | {
      readonly ok: false;
      /** `blocked`: every order was tried or ruled out. `budgetSpent`: the search was broken off, and nothing is known. */
      readonly reason: 'blocked' | 'budgetSpent';
      /** Bends that nothing was found for, each with what hindered it where it came farthest. Empty when the budget is spent. */
      readonly blockedBy: readonly BlockedBend[];
      readonly testsSpent: number;
    };

/** What any jobbing shop has: a straight, a gooseneck and an acute punch, V-dies of the chart, a hemming step. */
export const USUAL_TOOLING: Tooling = { punches: PUNCHES };

/** Tests of overlap after which a search is broken off: about a tenth of a second. */
export const USUAL_TEST_BUDGET = 400_000;

/**
 * An order in which a press brake can make all bends of a part, with punch, die and lie of the sheet for each.
 *
 * The search runs backwards from the formed part, where most is in the way, and opens one bend after another; what it learned of
 * a set of made bends it keeps, as their order decides nothing. Every stroke is looked at every 15 degrees from flat to its end:
 * panels and bends as thick plates against punch, die, ram, bed and side frames, and the part's two sides against each other.
 *
 * Assumed: punch and die as long as the bend line (sectional tooling), ram and bed beyond it on both sides; the sheet is brought in
 * while the punch is up, from the front or from the end; no springback; the bend that is being made is not held against the
 * tools that make it; a side that reaches over half the mouth from the bend's middle does not slip (the chart's shortest flange
 * is a rule of its own).
 */
export function findBendOrder(
  development: Development,
  tooling: Tooling = USUAL_TOOLING,
  testBudget: number = USUAL_TEST_BUDGET,
): BendOrder {
  const search = new Search(development, tooling, { left: testBudget });
  return search.run(testBudget);
}

interface Bend {
  readonly id: string;
  readonly zones: readonly BendZone[];
  /** Bends between it and the base. */
  readonly depth: number;
}

class Search {
  readonly #plates;
  readonly #bends: readonly Bend[];
  readonly #deadSets = new Set<string>();
  readonly #makeable = new Set<string>();
  /** A bend was found that fails in every order. */
  #isStuck = false;
  readonly #isHopeless = new Map<string, boolean>();
  readonly #farthest = new Map<string, Hindrance>();

  constructor(
    development: Development,
    private readonly tooling: Tooling,
    private readonly budget: TestBudget,
  ) {
    this.#plates = layOutPlates(development);
    this.#bends = bendsOf(development);
  }

  run(testBudget: number): BendOrder {
    const spent = (): number => testBudget - Math.max(0, this.budget.left);
    const order = this.#open(new Set(this.#bends.map(({ id }) => id)), null);
    // A stroke that was broken off showed nothing, so the budget is asked before the order.
    if (this.budget.left < 0) return { ok: false, reason: 'budgetSpent', blockedBy: [], testsSpent: testBudget };
    if (order !== null) return { ok: true, order, testsSpent: spent() };
    const hopeless = this.#isStuck ? this.#bends.filter((bend) => this.#fails(bend)) : [];
    const never = this.#bends.filter(({ id }) => !this.#makeable.has(id));
    const named = hopeless.length > 0 ? hopeless : never.length > 0 ? never : this.#bends;
    const blockedBy = named.flatMap(({ id }) => {
      const hindrance = this.#farthest.get(id);
      return hindrance === undefined ? [] : [{ bendId: id, hindrance }];
    });
    return { ok: false, reason: 'blocked', blockedBy, testsSpent: spent() };
  }

  /** Whether a bend fails whatever the others do: with its own two panels alone, and both as long as they ever are. */
  #fails(bend: Bend): boolean {
    const known = this.#isHopeless.get(bend.id);
    if (known !== undefined) return known;
    const isHopeless = this.#make(bend, new Set(), 'ownPanels') === null;
    this.#isHopeless.set(bend.id, isHopeless);
    return isHopeless;
  }

  /** Steps that make exactly these bends, or null. `after` is the step that follows them. */
  #open(made: ReadonlySet<string>, after: BendStep | null): readonly BendStep[] | null {
    if (made.size === 0) return [];
    const key = [...made].join('\n');
    if (this.#deadSets.has(key)) return null;
    for (const last of this.#candidates(made, after)) {
      if (this.#isStuck || this.budget.left < 0) return null;
      const before = new Set([...made].filter((id) => id !== last.id));
      const step = this.#make(last, before, 'wholePart');
      if (step === null) {
        if (this.#fails(last)) this.#isStuck = true;
        continue;
      }
      this.#makeable.add(last.id);
      const steps = this.#open(before, step);
      if (steps !== null) return [...steps, step];
    }
    this.#deadSets.add(key);
    return null;
  }

  /** Innermost bends are opened first, so that they are made last; the sheet is turned over as seldom as that allows. */
  #candidates(made: ReadonlySet<string>, after: BendStep | null): readonly Bend[] {
    const isTurned = (bend: Bend): number =>
      after === null || after.isTurnedOver === (bend.zones[0]?.direction === 'away') ? 0 : 1;
    return this.#bends.filter(({ id }) => made.has(id)).sort((a, b) => a.depth - b.depth || isTurned(a) - isTurned(b));
  }

  #make(bend: Bend, made: ReadonlySet<string>, against: 'wholePart' | 'ownPanels'): BendStep | null {
    const result = makeBend(this.#plates, bend.zones, made, this.tooling, against, this.budget);
    if ('step' in result) return result.step;
    const known = this.#farthest.get(bend.id);
    if (known === undefined || progressDeg(result.hindrance) > progressDeg(known))
      this.#farthest.set(bend.id, result.hindrance);
    return null;
  }
}

function progressDeg(hindrance: Hindrance): number {
  return hindrance.kind === 'hits' ? hindrance.atAngleDeg : -1;
}

function bendsOf({ bendTable, zones, panels }: Development): readonly Bend[] {
  const depthOf: number[] = [];
  for (const { index, parentIndex } of panels)
    depthOf[index] = parentIndex === null ? 0 : (depthOf[parentIndex] ?? 0) + 1;
  return bendTable.flatMap(({ bendId }) => {
    const own = zones.filter((zone) => zone.bendId === bendId);
    const depths = own.map(({ parentIndex }) => depthOf[parentIndex] ?? 0);
    return own.length === 0 ? [] : [{ id: bendId, zones: own, depth: Math.min(...depths) }];
  });
}
