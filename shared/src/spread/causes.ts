import type { BrakeSpread } from '../bending/leg-gains';

/** Why a formed size varies. */
export type Cause = 'gauging' | 'radius' | 'neutral' | 'thickness' | 'angle' | 'cut' | 'coat';

/** In words fit for a drawing. */
export const CAUSE_WORDS: Readonly<Record<Cause, string>> = {
  gauging: 'gauging on the brake',
  radius: 'the inside radius the die delivers',
  neutral: 'where the neutral line runs (K)',
  thickness: 'the thickness of the sheet',
  angle: 'the bend angle',
  cut: 'the cut',
  coat: 'the coat',
};

/** Build-up of a coat on each side, mm; both 0 for a bare part. */
export interface CoatSpread {
  readonly lowMm: number;
  readonly highMm: number;
}

export const NO_COAT: CoatSpread = { lowMm: 0, highMm: 0 };

/**
 * Against what a bend is gauged: a cut edge on one of its sides (beyond the child, away from the base, or beyond the parent), or
 * the outside of a bend made before, parallel to it and on the same panel.
 */
export type GaugingEdge =
  { readonly from: 'edge'; readonly side: 'child' | 'parent' } | { readonly from: 'bend'; readonly bendId: string };

/** Everything that is said about how a part will vary. Half-widths are two standard deviations of a normal distribution. */
export interface SpreadPlan {
  readonly brake: BrakeSpread;
  readonly coat: CoatSpread;
  /** By bend id; a bend that is not named is gauged as `usualGauging` says. */
  readonly gauging: ReadonlyMap<string, GaugingEdge>;
}
