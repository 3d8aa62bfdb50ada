import { allowanceFromDeductionMm, isPossibleK, isReferenceAllowed, kFactorFromAllowance } from './allowance';
import type { BendGeometry } from './allowance';
import type { BenderDeduction, StripSeries } from './bend-measurements';
import type { BendingStock, Provenance } from './development';
import type { LengthReference } from './layout';

/** A measured K with where it comes from. `halfWidth` null = nobody stated one. */
export interface MeasuredK {
  readonly kFactor: number;
  readonly provenance: Provenance;
  readonly halfWidth: number | null;
}

/** The first measurement that fits a bend, or null; `remarks` say which ones were passed over and why. */
export interface MeasuredKResult {
  readonly found: MeasuredK | null;
  readonly remarks: readonly string[];
}

/** Nominal thicknesses and dies are the same within this, mm. */
const SAME_NOMINAL_MM = 0.02;
/** Angles of one nominal bend, degrees. */
const SAME_ANGLE_DEG = 0.5;
/** Radii that a gauge can hardly tell apart, as a share of the thickness. */
const SAME_RADIUS_OVER_T = 0.2;
/** Two R/T that differ by less are one: rounding of radii and thicknesses to a thousandth. */
const SAME_RATIO = 0.001;

/**
 * K of a bend from measurements: first the bender's deduction for material, thickness and die, then own strips.
 * A deduction in the same die at the same angle is kept as it is and K follows from it and the bend's own radius, so that the
 * flat comes out as measured even where the radius was misread. For another angle K is carried over instead, and said so.
 * Strips give K between two series by straight line over R/T. Beyond the outermost series nothing is guessed: a remark says
 * what they cover, and the next source answers. Hems go by hems only.
 */
export function findMeasuredK(bend: BendGeometry, stock: BendingStock): MeasuredKResult {
  const measurements = stock.measurements;
  if (measurements === undefined) return { found: null, remarks: [] };
  const remarks: string[] = [];
  const usable = (candidate: MeasuredK | null): MeasuredK | null => {
    if (candidate === null || isPossibleK(candidate.kFactor)) return candidate;
    remarks.push(`${candidate.provenance.text} means K ${shown(candidate.kFactor)} here, which no sheet has: not used`);
    return null;
  };
  const found =
    usable(fromBender(bend, stock, measurements.benderDeductions, remarks)) ??
    usable(fromStrips(bend, stock, measurements.stripSeries, remarks));
  return { found, remarks };
}

/** A deduction with the bend it was taken from. */
interface TakenDeduction extends BendGeometry {
  readonly deductionMm: number;
  readonly reference: LengthReference;
}

/** K of a deduction taken in the same die: at the same angle with the bend's own radius, else as it was there. */
function carriedK(bend: BendGeometry, taken: TakenDeduction): number {
  const isSame = isSameAngle(bend, taken) && isReferenceAllowed(taken.reference, bend.bendAngleDeg);
  const form = isSame ? { ...bend, thicknessMm: taken.thicknessMm } : taken;
  return kFactorFromAllowance(form, allowanceFromDeductionMm(form, taken.deductionMm, taken.reference));
}

/** Whether something was measured on such sheet in such a die, at the radius the bend is to have. */
function isSameTooling(taken: TakenDeduction & SheetKey, bend: BendGeometry, stock: BendingStock): boolean {
  return isSameSheetAndDie(taken, stock) && hasSameRadius(taken, bend);
}

interface SheetKey {
  readonly materialId: string;
  readonly thicknessMm: number;
  readonly vOpeningMm: number;
}

function isSameSheetAndDie(taken: SheetKey, stock: BendingStock): boolean {
  return (
    taken.materialId === stock.materialId &&
    Math.abs(taken.thicknessMm - stock.thicknessMm) <= SAME_NOMINAL_MM &&
    Math.abs(taken.vOpeningMm - stock.vOpeningMm) <= SAME_NOMINAL_MM
  );
}

function hasSameRadius(taken: BendGeometry, bend: BendGeometry): boolean {
  return Math.abs(taken.insideRadiusMm - bend.insideRadiusMm) <= SAME_RADIUS_OVER_T * bend.thicknessMm;
}

function isSameAngle(a: BendGeometry, b: BendGeometry): boolean {
  return Math.abs(a.bendAngleDeg - b.bendAngleDeg) <= SAME_ANGLE_DEG;
}

function isHem({ bendAngleDeg }: BendGeometry): boolean {
  return bendAngleDeg === 180;
}

function nearestInAngle<Taken extends BendGeometry>(bend: BendGeometry, taken: readonly Taken[]): Taken | null {
  const gap = (one: Taken): number => Math.abs(one.bendAngleDeg - bend.bendAngleDeg);
  return taken.reduce<Taken | null>((best, one) => (best === null || gap(one) < gap(best) ? one : best), null);
}

function fromBender(
  bend: BendGeometry,
  stock: BendingStock,
  deductions: readonly BenderDeduction[],
  remarks: string[],
): MeasuredK | null {
  const inDie = deductions.filter((one) => isSameSheetAndDie(one, stock) && isHem(one) === isHem(bend));
  const taken = nearestInAngle(
    bend,
    inDie.filter((one) => hasSameRadius(one, bend)),
  );
  if (taken === null) {
    const other = inDie[0];
    if (other !== undefined) {
      remarks.push(
        `${other.benderName}'s deduction was measured at an inside radius of ${shown(other.insideRadiusMm)} mm, not ${shown(bend.insideRadiusMm)}: not used`,
      );
    }
    return null;
  }
  const carried = isSameAngle(bend, taken) ? '' : `, measured at ${shown(taken.bendAngleDeg)}° and carried over by K`;
  return {
    kFactor: carriedK(bend, taken),
    provenance: {
      text: `${taken.benderName}'s deduction ${shown(taken.deductionMm)} mm (${taken.reference}), V ${shown(taken.vOpeningMm)}, n ${String(taken.count)}${carried}`,
      source: `measured by ${taken.benderName}`,
      confidence: 'measured',
    },
    halfWidth: taken.halfWidthMm === null ? null : kPerMm(taken) * taken.halfWidthMm,
  };
}

/** How much K falls per mm of deduction: 1 / (rad(A) * T). */
function kPerMm({ bendAngleDeg, thicknessMm }: BendGeometry): number {
  return 180 / (Math.PI * bendAngleDeg * thicknessMm);
}

function fromStrips(
  bend: BendGeometry,
  stock: BendingStock,
  series: readonly StripSeries[],
  remarks: string[],
): MeasuredK | null {
  const ofMaterial = series.filter((one) => one.materialId === stock.materialId && isHem(one) === isHem(bend));
  if (ofMaterial.length === 0) return null;
  const own = nearestInAngle(
    bend,
    ofMaterial.filter((one) => isSameTooling(one, bend, stock)),
  );
  if (own !== null) {
    const carried = isSameAngle(bend, own) ? '' : `, bent to ${shown(own.bendAngleDeg)}° and carried over by K`;
    const text = `own strips, deduction ${shown(own.deductionMm)} mm (${own.reference}), V ${shown(own.vOpeningMm)}, n ${String(own.count)}${carried}`;
    return { kFactor: carriedK(bend, own), provenance: measuredHere(text), halfWidth: own.kHalfWidth };
  }
  const ratio = bend.insideRadiusMm / bend.thicknessMm;
  const points = ofMaterial.map((one) => ({ ratio: one.insideRadiusMm / one.thicknessMm, one }));
  const gap = (one: StripSeries): number => Math.abs(one.bendAngleDeg - bend.bendAngleDeg);
  // Where strips of several angles share one R/T, those nearest in angle speak.
  const sorted = points
    .filter(
      (point) => !points.some((other) => isSameRatio(other.ratio, point.ratio) && gap(other.one) < gap(point.one)),
    )
    .sort((a, b) => a.ratio - b.ratio);
  const below = sorted.filter((point) => point.ratio <= ratio + SAME_RATIO).at(-1);
  const above = sorted.find((point) => point.ratio >= ratio - SAME_RATIO);
  if (below === undefined || above === undefined) {
    const [low, high] = [sorted[0]?.ratio ?? ratio, sorted.at(-1)?.ratio ?? ratio];
    const range = low === high ? `R/T ${shown(low)} only` : `R/T ${shown(low)} to ${shown(high)}`;
    remarks.push(`own strips cover ${range}, this bend has ${shown(ratio)}: not carried beyond them`);
    return null;
  }
  const gapBetween = above.ratio - below.ratio;
  const share = gapBetween <= SAME_RATIO ? 0 : Math.min(1, Math.max(0, (ratio - below.ratio) / gapBetween));
  const between = (of: (one: StripSeries) => number): number => of(below.one) * (1 - share) + of(above.one) * share;
  const named = (point: { readonly ratio: number; readonly one: StripSeries }): string =>
    `${shown(point.ratio)} (${shown(point.one.bendAngleDeg)}°, V ${shown(point.one.vOpeningMm)}, n ${String(point.one.count)})`;
  const text =
    below.one === above.one
      ? `own strips at R/T ${named(below)}`
      : `own strips, between R/T ${named(below)} and ${named(above)}`;
  return {
    kFactor: between(({ kFactor }) => kFactor),
    provenance: measuredHere(text),
    halfWidth: between(({ kHalfWidth }) => kHalfWidth),
  };
}

function isSameRatio(a: number, b: number): boolean {
  return Math.abs(a - b) <= SAME_RATIO;
}

function measuredHere(text: string): Provenance {
  return { text, source: 'bend test strips of this workshop', confidence: 'measured' };
}

function shown(value: number): string {
  return String(Math.round(value * 1000) / 1000);
}
