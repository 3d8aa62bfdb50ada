import { halfTangent, setbackMm } from './allowance';
import type { BendGeometry, NeutralBend } from './allowance';
import type { LengthReference } from './layout';

/** How much a leg grows, measured to the outside of its bend, when one thing about the bend grows by one. */
export interface LegGains {
  readonly perRadiusMm: number;
  readonly perThicknessMm: number;
  readonly perK: number;
  readonly perDegree: number;
}

/** Half-widths of what varies at a brake, about two standard deviations each. */
export interface BrakeSpread {
  /** Place of each bend against its gauge. */
  readonly gaugingMm: number;
  /** Of each bend. */
  readonly angleDeg: number;
  /** Of the delivered radius, as a share of it: one die and one sheet, so all bends alike. */
  readonly radiusShare: number;
  /** Of the thickness, as a share of it. */
  readonly thicknessShare: number;
  /** Place of each cut edge and hole in the blank. */
  readonly cutMm: number;
}

/**
 * What to plan with when nothing is known of the shop. Common practice: gauging 0.4 mm and 1 degree a bend; radius, sheet
 * tolerance and laser by rule of thumb, no source.
 */
export const STANDARD_BRAKE: BrakeSpread = {
  gaugingMm: 0.4,
  angleDeg: 1,
  radiusShare: 0.15,
  thicknessShare: 0.05,
  cutMm: 0.1,
};

/** A careful shop on a good brake: gauging 0.25 mm and half a degree a bend. Common practice, no source. */
export const GOOD_BRAKE: BrakeSpread = { ...STANDARD_BRAKE, gaugingMm: 0.25, angleDeg: 0.5 };

/** What callipers find outside a bend: the apex up to 90 degrees, above it the outermost point. */
export function outsideReference(bendAngleDeg: number): LengthReference {
  return bendAngleDeg <= 90 ? 'outsideApex' : 'outsideTangent';
}

/** From the tangent line to what callipers find outside a bend, mm. */
export function outsideReachMm(bend: BendGeometry): number {
  return setbackMm(bend, outsideReference(bend.bendAngleDeg));
}

/**
 * Gains of one leg of a bend whose blank is cut to length: the bend takes half of its allowance from each leg, the leg reaches to
 * the outside of the bend, so leg = rest + reach - rad(A) * (R + K * T) / 2.
 * At 90 degrees a leg grows 1 - pi/4 = 0.215 mm per mm of radius, both legs together 0.43.
 * Source: derivatives of the bend formulas.
 */
export function legGains({ bendAngleDeg, insideRadiusMm, thicknessMm, kFactor }: NeutralBend): LegGains {
  const turnedRad = (bendAngleDeg * Math.PI) / 180;
  const neutralMm = insideRadiusMm + kFactor * thicknessMm;
  const isToApex = outsideReference(bendAngleDeg) === 'outsideApex';
  const reach = isToApex ? halfTangent(bendAngleDeg) : 1;
  // d tan(A/2) / dA = (1 + tan^2(A/2)) / 2; the outermost point keeps its distance whatever the angle.
  const reachPerRad = isToApex ? ((insideRadiusMm + thicknessMm) * (1 + reach ** 2)) / 2 : 0;
  return {
    perRadiusMm: reach - turnedRad / 2,
    perThicknessMm: reach - (turnedRad * kFactor) / 2,
    perK: -(turnedRad * thicknessMm) / 2,
    perDegree: ((reachPerRad - neutralMm / 2) * Math.PI) / 180,
  };
}
