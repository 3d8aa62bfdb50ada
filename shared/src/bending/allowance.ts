import type { LengthReference } from './layout';

/** A bend as far as its developed length depends on it. Angles are turned from flat: 0 flat, 90 square, 180 a hem. */
export interface BendGeometry {
  readonly bendAngleDeg: number;
  readonly insideRadiusMm: number;
  readonly thicknessMm: number;
}

/** A bend with the place of its neutral line: `kFactor` is its distance from the inside face over the thickness. */
export interface NeutralBend extends BendGeometry {
  readonly kFactor: number;
}

/** Largest value of K: the middle of the sheet, reached by bends of large radius. Source: theory of beams in bending. */
export const LARGEST_K = 0.5;

/** Whether K is one a sheet can have: 0 < K <= 0.5. Source: theory of beams in bending. */
export function isPossibleK(kFactor: number): boolean {
  return kFactor > 0 && kFactor <= LARGEST_K;
}

/** Whether an angle is one a sheet can be turned by: 0 < A <= 180. */
export function isBendAngle(bendAngleDeg: number): boolean {
  return bendAngleDeg > 0 && bendAngleDeg <= 180;
}

/**
 * Length of sheet used up between the tangent lines, mm: rad(A) * (R + K * T), the arc of the neutral line.
 * Source: S. Kalpakjian and S. R. Schmid, Manufacturing Engineering and Technology, bending of sheet metal.
 * @throws RangeError for an angle outside 0 < A <= 180, a K outside 0 < K <= 0.5, a negative radius, a thickness not above 0.
 */
export function bendAllowanceMm(bend: NeutralBend): number {
  assertGeometry(bend);
  if (!isPossibleK(bend.kFactor))
    throw new RangeError(`K must be above 0 and at most 0.5, got ${String(bend.kFactor)}`);
  return radians(bend.bendAngleDeg) * (bend.insideRadiusMm + bend.kFactor * bend.thicknessMm);
}

/** K that gives an allowance; may lie outside what a sheet can have, which is for the caller to judge. */
export function kFactorFromAllowance(bend: BendGeometry, allowanceMm: number): number {
  assertGeometry(bend);
  return (allowanceMm / radians(bend.bendAngleDeg) - bend.insideRadiusMm) / bend.thicknessMm;
}

/** Whether a reference has a finite setback at an angle: apexes run away as the angle nears 180 and are none at 180. */
export function isReferenceAllowed(reference: LengthReference, bendAngleDeg: number): boolean {
  return bendAngleDeg < 180 || (reference !== 'outsideApex' && reference !== 'insideApex');
}

/** What a leg is usually measured to when nothing else is said: the inside apex up to 90 degrees, the inside tangent above. */
export function usualReference(bendAngleDeg: number): LengthReference {
  return bendAngleDeg <= 90 ? 'insideApex' : 'insideTangent';
}

/**
 * Distance from the point a leg is measured to, back to the tangent line, mm.
 * Apex: tan(A/2) times the radius of the face. Tangent: the radius of the face for bends above 90 degrees, where the outermost
 * point of the bend is what callipers find; at 90 and below nothing stands out farther than the apex and both are the same.
 * `tangent` is the flat length itself: 0.
 * Source: plane geometry.
 * @throws RangeError for bends outside the range of `bendAllowanceMm`, and for an apex at 180 degrees.
 */
export function setbackMm(bend: BendGeometry, reference: LengthReference): number {
  assertGeometry(bend);
  if (!isReferenceAllowed(reference, bend.bendAngleDeg)) {
    throw new RangeError(`A bend of ${String(bend.bendAngleDeg)} degrees has no ${reference}`);
  }
  if (reference === 'tangent') return 0;
  const isOutside = reference === 'outsideApex' || reference === 'outsideTangent';
  const radiusMm = isOutside ? bend.insideRadiusMm + bend.thicknessMm : bend.insideRadiusMm;
  const isToTangent = reference === 'outsideTangent' || reference === 'insideTangent';
  if (isToTangent && bend.bendAngleDeg > 90) return radiusMm;
  return radiusMm * halfTangent(bend.bendAngleDeg);
}

/** Outside setback to the apex, mm: tan(A/2) * (R + T). */
export function outsideSetbackMm(bend: BendGeometry): number {
  return setbackMm(bend, 'outsideApex');
}

/** Inside setback to the apex, mm: tan(A/2) * R. */
export function insideSetbackMm(bend: BendGeometry): number {
  return setbackMm(bend, 'insideApex');
}

/**
 * What the sum of both legs exceeds the flat length by, mm: twice the setback less the allowance. Always goes with its
 * reference; negative where the flat is longer than the legs. Source: plane geometry.
 */
export function bendDeductionMm(bend: NeutralBend, reference: LengthReference): number {
  return 2 * setbackMm(bend, reference) - bendAllowanceMm(bend);
}

/** Allowance that a measured deduction stands for, mm. */
export function allowanceFromDeductionMm(bend: BendGeometry, deductionMm: number, reference: LengthReference): number {
  return 2 * setbackMm(bend, reference) - deductionMm;
}

/** The same leg measured to another reference, mm. Exact, and exact back again but for rounding. */
export function convertLegMm(legMm: number, bend: BendGeometry, from: LengthReference, to: LengthReference): number {
  return legMm - setbackMm(bend, from) + setbackMm(bend, to);
}

/** A deduction stated for another reference, mm. */
export function convertDeductionMm(
  deductionMm: number,
  bend: BendGeometry,
  from: LengthReference,
  to: LengthReference,
): number {
  return deductionMm - 2 * setbackMm(bend, from) + 2 * setbackMm(bend, to);
}

/**
 * Flat length of a strip, mm, from legs measured to one reference at every bend they end at.
 * @param legsMm one more than there are bends.
 * @throws RangeError when the counts do not fit.
 */
export function flatLengthMm(
  legsMm: readonly number[],
  bends: readonly NeutralBend[],
  reference: LengthReference,
): number {
  if (legsMm.length !== bends.length + 1) {
    throw new RangeError(
      `${String(bends.length)} bends need ${String(bends.length + 1)} legs, got ${String(legsMm.length)}`,
    );
  }
  const legs = legsMm.reduce((sum, leg) => sum + leg, 0);
  return legs - bends.reduce((sum, bend) => sum + bendDeductionMm(bend, reference), 0);
}

/** tan(A/2), exactly 1 at 90 degrees. */
export function halfTangent(bendAngleDeg: number): number {
  return bendAngleDeg === 90 ? 1 : Math.tan(radians(bendAngleDeg) / 2);
}

function radians(angleDeg: number): number {
  return (angleDeg * Math.PI) / 180;
}

function assertGeometry(bend: BendGeometry): void {
  if (!isBendAngle(bend.bendAngleDeg)) {
    throw new RangeError(`Bend angle must be above 0 and at most 180 degrees, got ${String(bend.bendAngleDeg)}`);
  }
  if (!(bend.insideRadiusMm >= 0) || !Number.isFinite(bend.insideRadiusMm)) {
    throw new RangeError(`Inside radius must be 0 or more, got ${String(bend.insideRadiusMm)}`);
  }
  if (!(bend.thicknessMm > 0) || !Number.isFinite(bend.thicknessMm)) {
    throw new RangeError(`Thickness must be above 0, got ${String(bend.thicknessMm)}`);
  }
}
