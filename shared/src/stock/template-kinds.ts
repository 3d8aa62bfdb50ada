import type { TableSource } from './figure';

/** What a template can be made of. */
export type TemplateKindId = 'card' | 'single-wall' | 'double-wall' | 'board' | 'mdf' | 'sheet-metal';

/** One kind of template material with the thickness it usually has. */
export interface TemplateKindRow extends TableSource {
  readonly id: TemplateKindId;
  readonly name: string;
  /** Null for sheet metal: its thickness comes from its gauge or callipers. */
  readonly usualThicknessMm: number | null;
  /** Where a crease in it turns: at the unbroken liner when scored, at mid-thickness, or not at all. */
  readonly usualHinge: 'liner' | 'middle' | 'rigid';
}

const USUAL = { source: 'usual thickness, no source; callipers decide', confidence: 'common-practice' } as const;

export const TEMPLATE_KINDS: readonly TemplateKindRow[] = [
  { id: 'card', name: 'Plain card', usualThicknessMm: 0.5, usualHinge: 'middle', ...USUAL },
  { id: 'single-wall', name: 'Corrugated board, single wall', usualThicknessMm: 3, usualHinge: 'liner', ...USUAL },
  { id: 'double-wall', name: 'Corrugated board, double wall', usualThicknessMm: 6, usualHinge: 'liner', ...USUAL },
  { id: 'board', name: 'Grey board', usualThicknessMm: 2, usualHinge: 'middle', ...USUAL },
  { id: 'mdf', name: 'MDF', usualThicknessMm: 3, usualHinge: 'rigid', ...USUAL },
  { id: 'sheet-metal', name: 'Sheet metal', usualThicknessMm: null, usualHinge: 'middle', ...USUAL },
];
