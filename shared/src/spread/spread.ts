import type { Development } from '../bending/development';
import { CAUSE_WORDS } from './causes';
import type { Cause, SpreadPlan } from './causes';
import { formerOf } from './formed-state';
import type { Former } from './formed-state';
import { measuresOf } from './measures';
import type { Measure } from './measures';
import { seededNumbers } from './seeded-normal';
import { readVariables } from './variables';
import type { Variable } from './variables';

/** A formed size with its spread, first order. Lengths mm. */
export interface SizeSpread {
  readonly kind: Measure['kind'];
  readonly label: string;
  readonly ids: readonly string[];
  /** As planned, over a coat of middling thickness. */
  readonly valueMm: number;
  readonly standardDeviationMm: number;
  /** Two standard deviations: 19 parts of 20 lie within. */
  readonly halfWidthMm: number;
  /** Share of the variance by cause; they sum to 1 (all 0 when nothing varies). */
  readonly shares: Readonly<Record<Cause, number>>;
  readonly mostlyFrom: string;
}

/** What seeded parts came out at. Lengths mm. */
export interface SampledSpread {
  readonly label: string;
  readonly meanMm: number;
  readonly standardDeviationMm: number;
}

/** A part ready to be formed many times. */
export interface SpreadModel {
  readonly variables: readonly Variable[];
  readonly measures: readonly Measure[];
  readonly form: Former;
}

/** Step of the central differences, as a share of the variable's standard deviation. */
const STEP_OF_DEVIATION = 0.01;
const CAUSES: readonly Cause[] = ['gauging', 'radius', 'neutral', 'thickness', 'angle', 'cut', 'coat'];

/**
 * Variables, measures and forming of a part under a plan.
 * @throws GaugingError when the plan gauges a bend against what isn't there
 */
export function spreadModel(development: Development, plan: SpreadPlan): SpreadModel {
  const model = readVariables(development, plan);
  const form = formerOf(development, model);
  const nominal = form(new Float64Array(model.variables.length));
  return { variables: model.variables, measures: measuresOf(development, model, plan.coat, nominal), form };
}

/**
 * Spread of every formed size, tip and hole distance across bends in closed form: slopes of the formed geometry by central
 * differences (step a hundredth of each variable's standard deviation), independent variables added as squares.
 * Radius, K, thickness and coat are common to all bends of a part (one die, one sheet); gauging and angle are each bend's own,
 * the cut each edge's and hole's.
 * @throws GaugingError as `spreadModel`
 */
export function spreadOf(development: Development, plan: SpreadPlan): readonly SizeSpread[] {
  return closedForm(spreadModel(development, plan));
}

/** `spreadOf` for a model that is there already. */
export function closedForm(model: SpreadModel): readonly SizeSpread[] {
  const { variables, measures, form } = model;
  const values = new Float64Array(variables.length);
  const nominal = form(values);
  const squares = measures.map(() => new Map<Cause, number>());
  variables.forEach(({ cause, standardDeviation }, index) => {
    if (!(standardDeviation > 0)) return;
    const step = STEP_OF_DEVIATION * standardDeviation;
    values[index] = step;
    const above = form(values);
    values[index] = -step;
    const below = form(values);
    values[index] = 0;
    measures.forEach(({ valueIn }, at) => {
      const move = ((valueIn(above) - valueIn(below)) / (2 * step)) * standardDeviation;
      squares[at]?.set(cause, (squares[at]?.get(cause) ?? 0) + move ** 2);
    });
  });
  return measures.map(({ kind, label, ids, valueIn }, at) => {
    const byCause = squares[at] ?? new Map<Cause, number>();
    const variance = [...byCause.values()].reduce((sum, one) => sum + one, 0);
    const share = (cause: Cause): number => (variance > 0 ? (byCause.get(cause) ?? 0) / variance : 0);
    const most = CAUSES.reduce((best, cause) => (share(cause) > share(best) ? cause : best), 'gauging');
    return {
      kind,
      label,
      ids,
      valueMm: valueIn(nominal),
      standardDeviationMm: Math.sqrt(variance),
      halfWidthMm: 2 * Math.sqrt(variance),
      shares: {
        gauging: share('gauging'),
        radius: share('radius'),
        neutral: share('neutral'),
        thickness: share('thickness'),
        angle: share('angle'),
        cut: share('cut'),
        coat: share('coat'),
      },
      mostlyFrom: CAUSE_WORDS[most],
    };
  });
}

/** Draws the values of all variables of one part, normal about nominal, into `values`. */
export function drawValues(variables: readonly Variable[], numbers: { normal(): number }, values: Float64Array): void {
  variables.forEach(({ standardDeviation }, index) => {
    values[index] = numbers.normal() * standardDeviation;
  });
}

/**
 * The same spreads from parts formed one by one with seeded numbers: no first order, every part folded whole.
 * @param count parts to form, at least 2
 */
export function sampleSpread(model: SpreadModel, seed: number, count: number): readonly SampledSpread[] {
  const { variables, measures, form } = model;
  const numbers = seededNumbers(seed);
  const values = new Float64Array(variables.length);
  const means = new Float64Array(measures.length);
  const squares = new Float64Array(measures.length);
  for (let part = 1; part <= count; part += 1) {
    drawValues(variables, numbers, values);
    const state = form(values);
    // Welford's running mean and sum of squares: small spreads of large sizes lose no digits.
    measures.forEach(({ valueIn }, at) => {
      const value = valueIn(state);
      const off = value - (means[at] ?? 0);
      means[at] = (means[at] ?? 0) + off / part;
      squares[at] = (squares[at] ?? 0) + off * (value - (means[at] ?? 0));
    });
  }
  return measures.map(({ label }, at) => ({
    label,
    meanMm: means[at] ?? 0,
    standardDeviationMm: Math.sqrt((squares[at] ?? 0) / (count - 1)),
  }));
}
