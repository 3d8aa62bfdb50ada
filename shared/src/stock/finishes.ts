import type { TableSource } from './figure';

/** A finish a part can have. Build-up is per side; a hole loses twice that on its diameter. */
export interface Finish extends TableSource {
  readonly id: string;
  readonly name: string;
  readonly process: 'none' | 'powder' | 'zinc' | 'anodise';
  readonly buildUpPerSideMm: { readonly low: number; readonly high: number };
  /** Colour to draw it in, sRGB hex; null = the metal's own. */
  readonly colourHex: string | null;
  readonly familyOnly: 'steel' | 'aluminium' | null;
}

const POWDER = {
  process: 'powder',
  buildUpPerSideMm: { low: 0.06, high: 0.12 },
  familyOnly: null,
  source: 'powder coat, 60 to 120 µm a side, industry figures',
  confidence: 'common-practice',
} as const;

export const FINISHES: readonly Finish[] = [
  {
    id: 'bare',
    name: 'Bare, deburred',
    process: 'none',
    buildUpPerSideMm: { low: 0, high: 0 },
    colourHex: null,
    familyOnly: null,
    source: 'no coating',
    confidence: 'published',
  },
  { id: 'powder-moss', name: 'Powder coat, moss', colourHex: '#4F5F3A', ...POWDER },
  { id: 'powder-cream', name: 'Powder coat, cream', colourHex: '#EFE6CF', ...POWDER },
  { id: 'powder-ember', name: 'Powder coat, ember', colourHex: '#B4532A', ...POWDER },
  { id: 'powder-slate', name: 'Powder coat, slate', colourHex: '#4A545C', ...POWDER },
  {
    id: 'zinc',
    name: 'Zinc plated',
    process: 'zinc',
    buildUpPerSideMm: { low: 0.005, high: 0.012 },
    colourHex: '#B9BFC2',
    familyOnly: 'steel',
    source: 'ISO 4042 and ISO 2081, usual thickness',
    confidence: 'common-practice',
  },
  {
    id: 'anodise',
    name: 'Anodised, natural',
    process: 'anodise',
    // Type II coatings of 1.8 to 25.4 µm, of which a third to a half stands above the old surface.
    buildUpPerSideMm: { low: 0.0006, high: 0.0127 },
    colourHex: '#C9CCCD',
    familyOnly: 'aluminium',
    source: 'MIL-PRF-8625 Type II thickness; growth a third to a half, common practice',
    confidence: 'common-practice',
  },
];

/** The finish with this id, or null. */
export function findFinish(finishId: string): Finish | null {
  return FINISHES.find((finish) => finish.id === finishId) ?? null;
}

/**
 * Smallest diameter a hole has left after coating, mm: the largest build-up on both sides of it.
 * @param diameterMm hole as cut
 */
export function coatedHoleMm(diameterMm: number, finish: Finish): number {
  return diameterMm - 2 * finish.buildUpPerSideMm.high;
}
