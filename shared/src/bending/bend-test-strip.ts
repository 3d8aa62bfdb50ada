import {
  allowanceFromDeductionMm,
  isBendAngle,
  isPossibleK,
  isReferenceAllowed,
  kFactorFromAllowance,
} from './allowance';
import type { BendGeometry } from './allowance';
import type { LengthReference } from './layout';

/** A strip of known length that was bent once and measured. All lengths mm, the angle as turned from flat, degrees. */
export interface BendTestStrip {
  readonly id: string;
  readonly materialId: string;
  readonly thicknessMm: number;
  /** Opening of the die it was bent in. */
  readonly vOpeningMm: number;
  readonly bendAngleDeg: number;
  /** Inside radius that came out, by a radius gauge. */
  readonly insideRadiusMm: number;
  /** Length of the strip before bending. */
  readonly blankMm: number;
  readonly legsMm: readonly [number, number];
  /** What the legs were measured to. */
  readonly reference: LengthReference;
}

/** By how much each reading of a strip may be wrong: half-widths. */
export interface MeasuringErrors {
  /** Of blank and both legs together, as it shows in the deduction. */
  readonly lengthMm: number;
  readonly radiusMm: number;
  readonly angleDeg: number;
  readonly thicknessMm: number;
}

/** Callipers, a set of radius gauges in steps of 0.5, a workshop protractor. Source: common practice. */
export const WORKSHOP_ERRORS: MeasuringErrors = { lengthMm: 0.1, radiusMm: 0.5, angleDeg: 0.5, thicknessMm: 0.02 };

/** How far K moves, always upwards counted, when one reading is wrong by its error and the others are right. */
export interface KShifts {
  readonly length: number;
  readonly radius: number;
  readonly angle: number;
  readonly thickness: number;
}

/** What one strip says. The deduction is what was measured; it means nothing without its reference and die. */
export interface StripReading {
  readonly strip: BendTestStrip;
  readonly deductionMm: number;
  /** Derived from the deduction; may lie outside 0 < K <= 0.5 when something was misread. */
  readonly kFactor: number;
  readonly shifts: KShifts;
  readonly warnings: readonly string[];
}

export type StripReadingResult =
  { readonly ok: true; readonly reading: StripReading } | { readonly ok: false; readonly message: string };

/**
 * Reads one bend test strip: deduction = both legs less the blank, to the reference the legs were measured to, and the K that
 * makes it. Says what the measuring error does to K.
 * Source: plane geometry, `BA = rad(A) * (R + K * T)` and `BD = 2 * setback - BA`.
 * @returns a refusal in words for sizes that are no sheet, an angle outside 0 < A <= 180, or an apex at 180 degrees.
 */
export function readStrip(strip: BendTestStrip, errors: MeasuringErrors = WORKSHOP_ERRORS): StripReadingResult {
  const refuse = (message: string): StripReadingResult => ({ ok: false, message: `Strip ${strip.id}: ${message}` });
  const [first, second] = strip.legsMm;
  const lengths = [strip.thicknessMm, strip.vOpeningMm, strip.blankMm, first, second];
  if (!lengths.every((length) => length > 0 && Number.isFinite(length)))
    return refuse('thickness, die, blank and legs must be above 0 mm.');
  if (!(strip.insideRadiusMm >= 0) || !Number.isFinite(strip.insideRadiusMm))
    return refuse('the inside radius must be 0 mm or more.');
  if (!isBendAngle(strip.bendAngleDeg)) return refuse('the bend must be above 0° and at most 180°.');
  if (!isReferenceAllowed(strip.reference, strip.bendAngleDeg))
    return refuse('a hem has no apex; measure its legs to the tangent.');
  const deductionMm = first + second - strip.blankMm;
  const kFactor = kFromReadings(strip, deductionMm, strip.reference);
  const shifts = shiftsOf(strip, deductionMm, errors);
  return { ok: true, reading: { strip, deductionMm, kFactor, shifts, warnings: warningsOf(kFactor, shifts, errors) } };
}

function kFromReadings(bend: BendGeometry, deductionMm: number, reference: LengthReference): number {
  return kFactorFromAllowance(bend, allowanceFromDeductionMm(bend, deductionMm, reference));
}

function shiftsOf(strip: BendTestStrip, deductionMm: number, errors: MeasuringErrors): KShifts {
  // At 90 and below a tangent reference is the apex; named so, a slightly larger angle doesn't change what is measured.
  const reference = strip.bendAngleDeg > 90 ? strip.reference : apexOf(strip.reference);
  const form = {
    bendAngleDeg: strip.bendAngleDeg,
    insideRadiusMm: strip.insideRadiusMm,
    thicknessMm: strip.thicknessMm,
  };
  const kAt = (changes: Partial<BendGeometry>, gainMm = 0): number =>
    kFromReadings({ ...form, ...changes }, deductionMm + gainMm, reference);
  const nominal = kAt({});
  // Towards less: a hem can't turn farther than 180, a bend of a fraction of a degree not backwards.
  const angleStepDeg = Math.min(errors.angleDeg, form.bendAngleDeg / 2);
  const thicknessStepMm = Math.min(errors.thicknessMm, form.thicknessMm / 2);
  return {
    length: Math.abs(kAt({}, errors.lengthMm) - nominal),
    radius: Math.abs(kAt({ insideRadiusMm: form.insideRadiusMm + errors.radiusMm }) - nominal),
    angle: Math.abs(kAt({ bendAngleDeg: form.bendAngleDeg - angleStepDeg }) - nominal),
    thickness: Math.abs(kAt({ thicknessMm: form.thicknessMm - thicknessStepMm }) - nominal),
  };
}

function apexOf(reference: LengthReference): LengthReference {
  if (reference === 'outsideTangent') return 'outsideApex';
  return reference === 'insideTangent' ? 'insideApex' : reference;
}

function warningsOf(kFactor: number, shifts: KShifts, errors: MeasuringErrors): readonly string[] {
  const error =
    `An error of ${String(errors.lengthMm)} mm in the lengths shifts K by ${shifts.length.toFixed(2)}, ` +
    `an inside radius misread by ${String(errors.radiusMm)} mm by ${shifts.radius.toFixed(2)}.`;
  if (isPossibleK(kFactor)) return [error];
  const range = `K comes out at ${kFactor.toFixed(3)}; a sheet has above 0 and at most 0.5. Measure radius and legs again.`;
  return [range, error];
}
