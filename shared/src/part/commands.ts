import type {
  BendDeclaration,
  Feature,
  HolePurpose,
  Layout,
  OutlineEdge,
  OutlineLoop,
  ReliefSettings,
} from '../bending/layout';
import type { Point } from '../geometry/point';
import type { Assembly, Mark } from './assembly';
import type { DeclaredUse, Making, PartDocument, SheetStock, StockRole, Template } from './part-document';

/**
 * Part of a document that a revert can put back on its own, so that undo never touches what somebody else changed.
 * `index` is the place in its list that a thing which is put back takes (last where absent): names such as H3 follow the
 * order, so an undone removal has to give the old order back.
 */
export type DocumentSlice =
  | { readonly slice: 'stock'; readonly role: StockRole; readonly value: SheetStock }
  | { readonly slice: 'template'; readonly value: Template | null }
  | { readonly slice: 'calibration'; readonly value: PartDocument['calibration'] }
  | { readonly slice: 'outer'; readonly value: OutlineLoop }
  | { readonly slice: 'cutout'; readonly id: string; readonly value: OutlineLoop | null; readonly index?: number }
  | { readonly slice: 'feature'; readonly id: string; readonly value: Feature | null; readonly index?: number }
  | { readonly slice: 'bend'; readonly id: string; readonly value: BendDeclaration | null; readonly index?: number }
  | { readonly slice: 'reliefs'; readonly value: ReliefSettings }
  | { readonly slice: 'baseAnchor'; readonly value: Point }
  | { readonly slice: 'making'; readonly value: Making }
  | { readonly slice: 'declaredUses'; readonly value: readonly DeclaredUse[] }
  | { readonly slice: 'assembly'; readonly value: Assembly | null }
  | { readonly slice: 'marks'; readonly value: readonly Mark[] };

export interface SliceChange {
  readonly before: DocumentSlice;
  readonly after: DocumentSlice;
}

/**
 * Every change of a part document, as data. New ids come inside the command, so a replay gives the same document.
 * The same commands are undo labels, the wire format, the audit trail and the tests' vocabulary.
 */
export type PartCommand =
  | { readonly kind: 'setStock'; readonly role: StockRole; readonly stock: SheetStock }
  | { readonly kind: 'setTemplate'; readonly template: Template | null }
  | { readonly kind: 'setCalibration'; readonly scaleX: number; readonly scaleY: number }
  | { readonly kind: 'replaceLayout'; readonly layout: Layout; readonly origin: 'trace' | 'starter' | 'import' }
  | { readonly kind: 'moveVertex'; readonly edgeId: string; readonly to: Point }
  | { readonly kind: 'insertVertex'; readonly edgeId: string; readonly newEdge: OutlineEdge }
  | { readonly kind: 'removeVertex'; readonly edgeId: string }
  | {
      readonly kind: 'setEdgeLength';
      readonly edgeId: string;
      readonly lengthMm: number;
      readonly hold: 'start' | 'end';
    }
  | { readonly kind: 'slideEdge'; readonly edgeId: string; readonly byMm: number }
  | { readonly kind: 'setEdgeBulge'; readonly edgeId: string; readonly bulge: number }
  | { readonly kind: 'roundCorner'; readonly edgeId: string; readonly radiusMm: number; readonly newEdgeId: string }
  | { readonly kind: 'addCutout'; readonly loop: OutlineLoop }
  | { readonly kind: 'removeCutout'; readonly loopId: string }
  | { readonly kind: 'addFeature'; readonly feature: Feature }
  | { readonly kind: 'moveFeature'; readonly featureId: string; readonly by: Point }
  | { readonly kind: 'setHolePurpose'; readonly featureId: string; readonly purpose: HolePurpose }
  | { readonly kind: 'setSlotSize'; readonly featureId: string; readonly lengthMm: number; readonly widthMm: number }
  | { readonly kind: 'removeFeature'; readonly featureId: string }
  | { readonly kind: 'addBend'; readonly bend: BendDeclaration }
  | { readonly kind: 'changeBend'; readonly bendId: string; readonly bend: BendDeclaration }
  | { readonly kind: 'removeBend'; readonly bendId: string }
  | { readonly kind: 'setReliefs'; readonly reliefs: ReliefSettings }
  | { readonly kind: 'setBaseAnchor'; readonly to: Point }
  | { readonly kind: 'setMaking'; readonly making: Making }
  | { readonly kind: 'setDeclaredUses'; readonly uses: readonly DeclaredUse[] }
  | { readonly kind: 'setAssembly'; readonly assembly: Assembly | null }
  | { readonly kind: 'setMarks'; readonly marks: readonly Mark[] }
  | {
      readonly kind: 'revert';
      readonly reason: 'undo' | 'redo';
      readonly of: string;
      readonly changes: readonly SliceChange[];
    };

export type PartCommandKind = PartCommand['kind'];
