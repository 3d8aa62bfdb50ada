import type { TableSource } from './figure';
import { MM_PER_INCH } from '../units/length';

/** Thicknesses that are usually on the rack, per material id, mm. Standards set tolerances, not these lists. */
export interface StockThicknesses extends TableSource {
  readonly product: string;
  readonly materialIds: readonly string[];
  readonly thicknessesMm: readonly number[];
}

const CUSTOMARY = { source: 'usual European stock, no source', confidence: 'common-practice' } as const;
const ALLOYS = ['al5052h32', 'al6061t6', 'al3003h14', 'al2024t3'] as const;

export const STOCK_THICKNESSES: readonly StockThicknesses[] = [
  {
    product: 'cold rolled',
    materialIds: ['dc01'],
    thicknessesMm: [0.5, 0.6, 0.7, 0.75, 0.8, 0.9, 1, 1.2, 1.25, 1.5, 1.75, 2, 2.5, 3],
    ...CUSTOMARY,
  },
  {
    product: 'hot rolled, pickled',
    materialIds: ['hrpo'],
    thicknessesMm: [1.5, 2, 2.5, 3, 4, 5, 6, 8, 10],
    ...CUSTOMARY,
  },
  {
    product: 'galvanised',
    materialIds: ['galv'],
    thicknessesMm: [0.5, 0.6, 0.7, 0.75, 0.8, 0.9, 1, 1.2, 1.25, 1.5, 2, 2.5, 3],
    ...CUSTOMARY,
  },
  {
    product: 'stainless',
    materialIds: ['ss304', 'ss316'],
    thicknessesMm: [0.5, 0.6, 0.7, 0.8, 0.9, 1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6],
    ...CUSTOMARY,
  },
  {
    product: 'aluminium',
    materialIds: [...ALLOYS],
    thicknessesMm: [0.5, 0.6, 0.7, 0.8, 1, 1.2, 1.5, 1.6, 2, 2.5, 3, 4, 5, 6],
    ...CUSTOMARY,
  },
  {
    product: 'aluminium, inch sizes',
    materialIds: [...ALLOYS],
    thicknessesMm: [0.02, 0.025, 0.032, 0.04, 0.05, 0.063, 0.08, 0.09, 0.1, 0.125, 0.16, 0.19, 0.25].map(
      (inches) => inches * MM_PER_INCH,
    ),
    source: 'usual US stock (preferred sizes of ANSI B32), no source',
    confidence: 'common-practice',
  },
  {
    product: 'copper and brass',
    materialIds: ['cu110', 'br260'],
    thicknessesMm: [0.5, 0.8, 1, 1.2, 1.5, 2, 3],
    source: 'usual stock, from memory',
    confidence: 'memory',
  },
  {
    product: 'titanium',
    materialIds: ['ti2'],
    thicknessesMm: [0.5, 0.8, 1, 1.2, 1.5, 2, 3],
    source: 'usual stock, from memory',
    confidence: 'memory',
  },
];

/** Thicknesses on the rack for a material, mm, rising, without repeats. Empty for an unknown material. */
export function stockThicknessesMm(materialId: string): readonly number[] {
  const all = STOCK_THICKNESSES.filter((row) => row.materialIds.includes(materialId)).flatMap(
    (row) => row.thicknessesMm,
  );
  return [...new Set(all)].sort((a, b) => a - b);
}
