import {
  allowanceFromDeductionMm,
  isPossibleK,
  isReferenceAllowed,
  kFactorFromAllowance,
  LARGEST_K,
} from './allowance';
import type { BendGeometry } from './allowance';
import type { BendingStock, KBand, Provenance } from './development';
import { DIN_6935, dinKFactor } from './din-6935';
import type { BendOverride } from './layout';
import { findMeasuredK } from './measured-k';

/** K of one bend and where it comes from. */
export interface KChoice {
  readonly ok: true;
  readonly kFactor: number;
  readonly provenance: Provenance;
  /** By how much K may be off, about two standard deviations. */
  readonly halfWidth: number;
  /** Said when K lies outside the material's own band, or a measurement was passed over; else null. */
  readonly note: string | null;
}

/** Why a bend has no usable K. */
export interface KRefusal {
  readonly ok: false;
  readonly code: 'kOutOfRange' | 'referenceNotAllowed';
  readonly message: string;
}

/** Up to this R/T the textbooks put the neutral line at a third of the thickness, from there on in the middle. */
const TEXTBOOK_RATIO = 2;
const TEXTBOOK_K_TIGHT = 0.33;

/** Half-width of K to plan with where no band is known. Common practice, no source. */
const PLAN_HALF_WIDTH = 0.03;

/**
 * K of a bend, from the first source that has one: entered by hand, the bender's measured deduction, own bend test strips, the
 * material's table, DIN 6935 for steel, and last the textbook rule. Hems count K 0.5 unless a person or a measurement says
 * otherwise. The source travels with the number, and so does its spread: a measurement's own, else as far as the material's band
 * reaches from it (0.03 where no band is known).
 * @param override what a person entered for this bend, or null.
 */
export function chooseKFactor(
  bend: BendGeometry,
  override: BendOverride | null,
  stock: BendingStock,
): KChoice | KRefusal {
  const ratio = bend.insideRadiusMm / bend.thicknessMm;
  if (override !== null) return fromOverride(bend, override, stock, ratio);
  const measured = findMeasuredK(bend, stock);
  const choice =
    measured.found === null
      ? fromTables(bend, stock, ratio)
      : judged(measured.found.kFactor, measured.found.provenance, stock, ratio, measured.found.halfWidth);
  if (measured.remarks.length === 0) return choice;
  const remarks = measured.remarks.join('; ');
  if (!choice.ok) return { ...choice, message: `${choice.message} (${remarks})` };
  return { ...choice, note: choice.note === null ? remarks : `${choice.note}; ${remarks}` };
}

function fromTables(bend: BendGeometry, stock: BendingStock, ratio: number): KChoice | KRefusal {
  if (bend.bendAngleDeg === 180) {
    const text = 'hem: neutral line in the middle of the sheet unless measured';
    return {
      ok: true,
      kFactor: LARGEST_K,
      provenance: { text, source: 'common practice, no source', confidence: 'common-practice' },
      halfWidth: PLAN_HALF_WIDTH,
      note: null,
    };
  }
  const row = stock.kTable.find((one) => ratio >= one.ratioFrom && (one.ratioTo === null || ratio < one.ratioTo));
  if (row !== undefined) {
    const span =
      row.ratioTo === null ? `from ${String(row.ratioFrom)}` : `${String(row.ratioFrom)} to ${String(row.ratioTo)}`;
    const isWhole = row.ratioFrom === 0 && row.ratioTo === null;
    const text = `table by material, ${stock.materialName}${isWhole ? '' : `, R/T ${span}`}`;
    return judged(row.kFactor, { text, source: row.source, confidence: row.confidence }, stock, ratio);
  }
  if (stock.family === 'steel') {
    const kFactor = dinKFactor(ratio);
    if (kFactor === null) {
      return {
        ok: false,
        code: 'kOutOfRange',
        message: `No source gives K for an inside radius of ${shown(ratio)} T: ${DIN_6935} starts at 0.1 T. Enter K by hand or ask for a larger radius.`,
      };
    }
    const text = `formula for steel, R/T ${shown(ratio)}`;
    return judged(kFactor, { text, source: DIN_6935, confidence: 'published' }, stock, ratio);
  }
  const text = ratio < TEXTBOOK_RATIO ? 'textbook rule, R below 2 T' : 'textbook rule, R of 2 T or more';
  const source = 'M. P. Groover, Fundamentals of Modern Manufacturing, sheet-metal bending';
  const kFactor = ratio < TEXTBOOK_RATIO ? TEXTBOOK_K_TIGHT : LARGEST_K;
  return judged(kFactor, { text, source, confidence: 'published' }, stock, ratio);
}

function fromOverride(
  bend: BendGeometry,
  override: BendOverride,
  stock: BendingStock,
  ratio: number,
): KChoice | KRefusal {
  const reason = override.reason.trim() === '' ? 'no reason given' : override.reason.trim();
  if (override.kind === 'kFactor') {
    if (!isPossibleK(override.kFactor)) return outOfRange(`K ${shown(override.kFactor)} entered by hand`);
    return judged(
      override.kFactor,
      { text: `entered by hand: ${reason}`, source: 'entered by hand', confidence: 'entered' },
      stock,
      ratio,
    );
  }
  if (!isReferenceAllowed(override.reference, bend.bendAngleDeg)) {
    return {
      ok: false,
      code: 'referenceNotAllowed',
      message: `A bend of ${shown(bend.bendAngleDeg)}° has no apex, so its deduction can't be stated to one. State it to the tangent.`,
    };
  }
  const allowance = allowanceFromDeductionMm(bend, override.deductionMm, override.reference);
  const kFactor = kFactorFromAllowance(bend, allowance);
  if (!isPossibleK(kFactor)) {
    return outOfRange(
      `A deduction of ${shown(override.deductionMm)} mm at an inside radius of ${shown(bend.insideRadiusMm)} mm means K ${shown(kFactor)}`,
    );
  }
  const text = `deduction ${shown(override.deductionMm)} mm (${override.reference}) entered by hand: ${reason}`;
  return judged(kFactor, { text, source: 'entered by hand', confidence: 'entered' }, stock, ratio);
}

function outOfRange(subject: string): KRefusal {
  return {
    ok: false,
    code: 'kOutOfRange',
    message: `${subject}; it must be above 0 and at most 0.5. Check the inside radius and the thickness.`,
  };
}

function judged(
  kFactor: number,
  provenance: Provenance,
  stock: BendingStock,
  ratio: number,
  measuredHalfWidth: number | null = null,
): KChoice | KRefusal {
  if (!isPossibleK(kFactor)) return outOfRange(`K ${shown(kFactor)} from ${provenance.text}`);
  const band = bandFor(stock.kBands, ratio);
  const halfWidth = measuredHalfWidth ?? reachOfBand(kFactor, band);
  return { ok: true, kFactor, provenance, halfWidth, note: bandNote(kFactor, band) };
}

/** How far the far end of the band lies from K: what is not measured may turn out to be anywhere in it. */
function reachOfBand(kFactor: number, band: KBand | null): number {
  return band === null ? PLAN_HALF_WIDTH : Math.max(Math.abs(band.low - kFactor), Math.abs(band.high - kFactor));
}

/** The band that holds at a ratio of inside radius to thickness; null when the material has none. */
function bandFor(bands: readonly KBand[], ratio: number): KBand | null {
  return bands.find((band) => band.ratioBelow === null || ratio < band.ratioBelow) ?? null;
}

function bandNote(kFactor: number, band: KBand | null): string | null {
  if (band === null || (kFactor >= band.low && kFactor <= band.high)) return null;
  const side = kFactor < band.low ? 'below' : 'above';
  return `K ${shown(kFactor)} lies ${side} the band usual for this material, ${shown(band.low)} to ${shown(band.high)} (${band.source})`;
}

function shown(value: number): string {
  return String(Math.round(value * 1000) / 1000);
}
