/** One inch in millimetres, exact. Source: international yard and pound agreement of 1959 (ISO 31-1). */
export const MM_PER_INCH = 25.4;

export type LengthUnit = 'mm' | 'in';

/** What came of reading a typed length. `reason` is a sentence for the person who typed it. */
export type LengthReading =
  | { readonly ok: true; readonly valueMm: number; readonly unit: LengthUnit }
  | { readonly ok: false; readonly reason: string };

/** How lengths are shown. Fractions are rounded to the nearest 1/denominator and reduced. */
export type LengthStyle =
  | { readonly unit: 'mm'; readonly decimals: number }
  | { readonly unit: 'in'; readonly form: 'decimal'; readonly decimals: number }
  | { readonly unit: 'in'; readonly form: 'fraction'; readonly denominator: 2 | 4 | 8 | 16 | 32 | 64 };

/** Two decimals of a millimetre: what callipers can check. */
export const MM_STYLE: LengthStyle = { unit: 'mm', decimals: 2 };

const UNIT_WORDS: ReadonlyMap<string, { readonly unit: LengthUnit; readonly mm: number }> = new Map([
  ['mm', { unit: 'mm', mm: 1 }],
  ['cm', { unit: 'mm', mm: 10 }],
  ['m', { unit: 'mm', mm: 1000 }],
  ['in', { unit: 'in', mm: MM_PER_INCH }],
  ['inch', { unit: 'in', mm: MM_PER_INCH }],
  ['inches', { unit: 'in', mm: MM_PER_INCH }],
  ['"', { unit: 'in', mm: MM_PER_INCH }],
  ['″', { unit: 'in', mm: MM_PER_INCH }],
  ['”', { unit: 'in', mm: MM_PER_INCH }],
  ["''", { unit: 'in', mm: MM_PER_INCH }],
]);

const LENGTH =
  /^([+-]?)\s*(?:(\d+)[\s-]+(\d+)\s*[/⁄]\s*(\d+)|(\d+)\s*[/⁄]\s*(\d+)|(\d+(?:[.,]\d*)?|[.,]\d+))\s*([a-z]+|"|″|”|'')?\.?$/i;

/**
 * Reads a typed length: `12`, `12 mm`, `12,5`, `0.5in`, `1 3/8"`, `1-3/8 in`, `3/8"`.
 * A comma counts as the decimal sign, because a single one is never a thousands separator in a length of a bracket;
 * two separators in one number are refused rather than guessed at.
 * @param text what was typed
 * @param bareUnit unit of a number that names none
 * @returns the length in mm (sign kept), or why it cannot be read
 */
export function parseLength(text: string, bareUnit: LengthUnit = 'mm'): LengthReading {
  const trimmed = text.trim();
  if (trimmed === '') return { ok: false, reason: 'Type a length, for example 12, 0.5 in or 1 3/8".' };
  const match = LENGTH.exec(trimmed);
  if (match === null) {
    return { ok: false, reason: `“${trimmed}” is not a length. Examples: 12, 12.5 mm, 0.5 in, 1 3/8".` };
  }
  const [, sign, whole, mixedTop, mixedBottom, top, bottom, plain, word] = match;
  const unit = UNIT_WORDS.get((word ?? bareUnit).toLowerCase());
  if (unit === undefined) return { ok: false, reason: `“${word ?? ''}” is not a unit of length here; use mm or in.` };
  const numerator = mixedTop ?? top;
  const denominator = mixedBottom ?? bottom;
  let amount: number;
  if (numerator !== undefined && denominator !== undefined) {
    if (Number(denominator) === 0) return { ok: false, reason: 'A fraction cannot have 0 below its line.' };
    amount = Number(whole ?? '0') + Number(numerator) / Number(denominator);
  } else {
    amount = Number((plain ?? '').replace(',', '.'));
  }
  const valueMm = (sign === '-' ? -1 : 1) * amount * unit.mm;
  if (!Number.isFinite(valueMm)) return { ok: false, reason: `“${trimmed}” is too large.` };
  return { ok: true, valueMm, unit: unit.unit };
}

/**
 * Writes a length in the style a person chose, with its unit.
 * Decimals keep no trailing zeros beyond the first figure ("12 mm", "12.5 mm"); inch fractions are reduced
 * ("1 3/8\"", "0\"", "-5/64\"").
 * @param valueMm length in mm
 * @param style unit and rounding
 * @throws RangeError when `valueMm` is not finite
 */
export function formatLength(valueMm: number, style: LengthStyle = MM_STYLE): string {
  if (!Number.isFinite(valueMm)) throw new RangeError(`formatLength: valueMm is ${valueMm}`);
  if (style.unit === 'mm') return `${formatDecimal(valueMm, style.decimals)} mm`;
  const inches = valueMm / MM_PER_INCH;
  if (style.form === 'decimal') return `${formatDecimal(inches, style.decimals)} in`;
  return `${formatFraction(inches, style.denominator)}"`;
}

/**
 * A number rounded to so many decimals without trailing zeros and without "-0".
 * @param value any finite number
 * @param decimals 0 to 10
 */
export function formatDecimal(value: number, decimals: number): string {
  const fixed = value.toFixed(decimals);
  const short = fixed.includes('.') ? fixed.replace(/0+$/, '').replace(/\.$/, '') : fixed;
  return short === '-0' ? '0' : short;
}

function formatFraction(inches: number, denominator: number): string {
  const parts = Math.round(Math.abs(inches) * denominator);
  if (parts === 0) return '0';
  const sign = inches < 0 ? '-' : '';
  const whole = Math.floor(parts / denominator);
  let top = parts - whole * denominator;
  let bottom = denominator;
  while (top !== 0 && top % 2 === 0) {
    top /= 2;
    bottom /= 2;
  }
  if (top === 0) return `${sign}${whole}`;
  return whole === 0 ? `${sign}${top}/${bottom}` : `${sign}${whole} ${top}/${bottom}`;
}
