import type { BendDirection, CardReading, Layout } from '../bending/layout';
import type { Assembly, Mark } from './assembly';

/** A sheet to make the part from. */
export interface SheetStock {
  readonly materialId: string;
  readonly thicknessMm: number;
  /** Direction of rolling in the layout, degrees from +x; null = unknown, counted as the worst case. */
  readonly grainDirectionDeg: number | null;
  /** V-die the shop would use; null = the table's for this thickness. */
  readonly vOpeningMm: number | null;
}

export type TemplateKind = 'card' | 'single-wall' | 'double-wall' | 'board' | 'mdf' | 'sheet-metal';

/** The physical template the layout was taken from. Face A is the one that shows in the photo. */
export interface Template {
  readonly kind: TemplateKind;
  readonly thicknessMm: number;
  readonly reading: CardReading;
  /** Way its flanges fold as face A shows: what a new bend is proposed as. Absent when nobody said. */
  readonly flangesFold?: BendDirection;
}

export type StockRole = 'trial' | 'production';

export interface Making {
  readonly bender: 'own-brake' | 'outside';
  readonly statement: 'cut-and-bend-to-our-flat' | 'formed-sizes-rule';
}

/** The only thing stored for a draft beside its command log. Everything else is computed from it. */
export interface PartDocument {
  readonly schemaVersion: 1;
  readonly stocks: { readonly trial: SheetStock; readonly production: SheetStock };
  /** Null for a part that started from typed dimensions. */
  readonly template: Template | null;
  /** One measured length per axis may overrule the photo's scale: factors applied when a trace is accepted. */
  readonly calibration: { readonly scaleX: number; readonly scaleY: number };
  readonly layout: Layout;
  readonly making: Making;
  /** A use a person declared that calls for a caution ("vehicle", "pressure", ...). */
  readonly declaredUses: readonly DeclaredUse[];
  /** Absent when nobody said. */
  readonly assembly?: Assembly;
  /** Absent when there are none. */
  readonly marks?: readonly Mark[];
}

export type DeclaredUse =
  'vehicle' | 'fuel' | 'pressure' | 'heat' | 'vibration' | 'lifting-people' | 'seat' | 'steering' | 'brakes';
