import type { PriceBreak, QuoteRequest, Readings } from './wire';
import type { ShopSheet } from './sheet-list';

/**
 * Price of a quantity, in lines. The rates are the invented shop's own:
 * a fixed sum for the set-up and for each tool of the press brake, the running part by cut length, pierces, bends and
 * the mass of the rectangle around the blank; from ten and fifty pieces on, the running part gets cheaper.
 */
const RATES = {
  setUpMinor: 1800,
  toolMinor: 650,
  bendMinor: 95,
  pierceMinorPerMm: 6,
  deburrMinorPerMetre: 22,
  packingMinor: 590,
  gapAroundBlankMm: 8,
} as const;

const RUNNING_SHARE: readonly { readonly from: number; readonly share: number }[] = [
  { from: 50, share: 0.84 },
  { from: 10, share: 0.93 },
  { from: 1, share: 1 },
];

/** Dollars for a euro, fixed for the stand-in. */
const DOLLARS_PER_EURO = 1.08;

export function priceQuantity(
  request: QuoteRequest,
  readings: Readings,
  sheet: ShopSheet,
  quantity: number,
): PriceBreak {
  const share = RUNNING_SHARE.find((row) => quantity >= row.from)?.share ?? 1;
  const rate = request.currency === 'USD' ? DOLLARS_PER_EURO : 1;
  const once = (minor: number) => Math.round(minor * rate);
  const running = (minorEach: number) => Math.round(minorEach * quantity * share * rate);
  const metres = readings.cutLengthMm / 1000;
  const massKg =
    ((readings.widthMm + RATES.gapAroundBlankMm) / 1000) *
    ((readings.heightMm + RATES.gapAroundBlankMm) / 1000) *
    (request.thicknessMm / 1000) *
    sheet.densityKgPerM3;
  const tools = new Set(request.bends.map((bend) => `${bend.angleDeg} ${bend.insideRadiusMm}`)).size;
  // Thicker sheet cuts more slowly, a little faster than in proportion.
  const minorPerMetre = sheet.minorPerMetreAtOneMm * request.thicknessMm ** 1.2;

  const lines = [
    { label: 'Set-up and nesting', amountMinor: once(RATES.setUpMinor) },
    { label: `Sheet, ${massKg.toFixed(3)} kg each with margin`, amountMinor: running(massKg * sheet.minorPerKg) },
    { label: `Cutting, ${metres.toFixed(2)} m each`, amountMinor: running(metres * minorPerMetre) },
    {
      label: `Piercing, ${readings.pierces} each`,
      amountMinor: running(readings.pierces * RATES.pierceMinorPerMm * request.thicknessMm),
    },
    { label: 'Deburring', amountMinor: running(metres * RATES.deburrMinorPerMetre) },
    ...(request.bends.length === 0
      ? []
      : [
          {
            label: `Press brake set-up, ${tools} ${tools === 1 ? 'tool' : 'tools'}`,
            amountMinor: once(tools * RATES.toolMinor),
          },
          {
            label: `Bending, ${request.bends.length} each`,
            amountMinor: running(request.bends.length * RATES.bendMinor),
          },
        ]),
    { label: 'Packing and carriage', amountMinor: once(RATES.packingMinor) },
  ];
  const totalMinor = lines.reduce((sum, line) => sum + line.amountMinor, 0);
  return {
    quantity,
    eachMinor: Math.round(totalMinor / quantity),
    totalMinor,
    leadTimeDays: 4 + (request.bends.length === 0 ? 0 : 2) + Math.ceil(quantity / 25),
    lines,
  };
}
