/** A sheet that the invented shop keeps, by its own names, with its own (invented) prices. */
export interface ShopSheet {
  readonly code: string;
  readonly name: string;
  readonly densityKgPerM3: number;
  readonly minorPerKg: number;
  /** Price of one metre of cut at 1 mm; it grows with thickness. */
  readonly minorPerMetreAtOneMm: number;
  readonly thicknessesMm: readonly number[];
}

const STEEL = { densityKgPerM3: 7850, minorPerMetreAtOneMm: 70 } as const;
const ALLOY = { densityKgPerM3: 2690, minorPerMetreAtOneMm: 95 } as const;
const ALLOY_MM = [1, 1.5, 1.6, 2, 2.5, 3, 4, 5, 6, 1.2954, 2.032, 2.286, 2.54, 3.175, 4.826];

export const SHOP_SHEETS: readonly ShopSheet[] = [
  {
    code: 'DC01',
    name: 'cold rolled steel',
    minorPerKg: 190,
    thicknessesMm: [0.75, 0.8, 1, 1.2, 1.25, 1.5, 2, 2.5, 3],
    ...STEEL,
  },
  { code: 'DD11', name: 'pickled steel', minorPerKg: 175, thicknessesMm: [2, 2.5, 3, 4, 5, 6, 8], ...STEEL },
  {
    code: 'DX51D',
    name: 'galvanised steel',
    minorPerKg: 205,
    thicknessesMm: [0.75, 0.8, 1, 1.2, 1.25, 1.5, 2, 3],
    ...STEEL,
  },
  {
    code: '1.4301',
    name: 'stainless 304',
    minorPerKg: 520,
    thicknessesMm: [0.8, 1, 1.2, 1.5, 2, 2.5, 3, 4, 5],
    ...STEEL,
    minorPerMetreAtOneMm: 110,
  },
  {
    code: '1.4401',
    name: 'stainless 316',
    minorPerKg: 690,
    thicknessesMm: [1, 1.5, 2, 3],
    ...STEEL,
    minorPerMetreAtOneMm: 115,
  },
  { code: 'AW-5052-H32', name: 'aluminium 5052', minorPerKg: 640, thicknessesMm: ALLOY_MM, ...ALLOY },
  { code: 'AW-6061-T6', name: 'aluminium 6061', minorPerKg: 690, thicknessesMm: ALLOY_MM, ...ALLOY },
  { code: 'AW-3003-H14', name: 'aluminium 3003', minorPerKg: 600, thicknessesMm: [1, 1.5, 2, 3], ...ALLOY },
  {
    code: 'CW-CU110',
    name: 'copper',
    densityKgPerM3: 8890,
    minorPerKg: 1450,
    minorPerMetreAtOneMm: 190,
    thicknessesMm: [1, 1.5, 2],
  },
  {
    code: 'CW-CUZN30',
    name: 'brass',
    densityKgPerM3: 8530,
    minorPerKg: 1180,
    minorPerMetreAtOneMm: 170,
    thicknessesMm: [1, 1.5, 2],
  },
];

/** The sheet of a code in a thickness, or why there is none. */
export function findSheet(code: string, thicknessMm: number): ShopSheet | string {
  const sheet = SHOP_SHEETS.find((known) => known.code === code);
  if (sheet === undefined) return `We do not stock ${code}.`;
  if (sheet.thicknessesMm.some((known) => Math.abs(known - thicknessMm) < 0.03)) return sheet;
  return `We do not stock ${sheet.name} in ${thicknessMm} mm; we have ${sheet.thicknessesMm.join(', ')} mm.`;
}
