import type { Point } from '../geometry/point';

/**
 * One edge of a closed chain, stored by where it starts. It ends where the next edge starts, so a chain is closed by
 * construction. `bulge` is tan(sweep/4): 0 a straight edge, positive a counter-clockwise arc, 1 a half circle.
 */
export interface OutlineEdge {
  readonly id: string;
  readonly start: Point;
  readonly bulge: number;
}

/** A closed chain of lines and arcs in layout coordinates. */
export interface OutlineLoop {
  readonly id: string;
  readonly edges: readonly OutlineEdge[];
}

/** What a hole is for. Its diameter follows from the fastener tables, except for `plain` and `lightening`. */
export type HolePurpose =
  | { readonly kind: 'clearance'; readonly thread: string; readonly fit: 'close' | 'medium' | 'coarse' }
  | { readonly kind: 'tapped'; readonly thread: string }
  | { readonly kind: 'rivet-nut'; readonly thread: string }
  | { readonly kind: 'countersunk'; readonly thread: string }
  | { readonly kind: 'pass-through'; readonly diameterMm: number }
  | { readonly kind: 'plain'; readonly diameterMm: number }
  | { readonly kind: 'lightening'; readonly diameterMm: number };

export interface HoleFeature {
  readonly kind: 'hole';
  readonly id: string;
  readonly centre: Point;
  readonly purpose: HolePurpose;
}

/** An obround; `from` and `to` are the centres of its end radii. */
export interface SlotFeature {
  readonly kind: 'slot';
  readonly id: string;
  readonly from: Point;
  readonly to: Point;
  readonly widthMm: number;
}

export type Feature = HoleFeature | SlotFeature;

export type BendDirection = 'towards' | 'away';

/** Which measure of a formed leg a length means. DEVELOPERS.md explains the five. */
export type LengthReference = 'outsideApex' | 'insideApex' | 'outsideTangent' | 'insideTangent' | 'tangent';

/** Where a card bends without stretching. `depth` is measured from face A. */
export type CardHinge =
  | { readonly kind: 'liner'; readonly face: 'A' | 'B' }
  | { readonly kind: 'middle' }
  | { readonly kind: 'depth'; readonly depthMm: number };

/** The three facts that card carries into metal, asked once per template and overridable per bend. */
export interface CardReading {
  /** Surface on which the lengths were read; `crease` when the template was measured lying flat. */
  readonly readOn: 'faceA' | 'faceB' | 'crease';
  /** Face that bears on the machine: its position is held in metal. */
  readonly bearingFace: 'A' | 'B';
  readonly hinge: CardHinge;
}

/** What the layout's lengths mean at one bend. */
export type BendLengths =
  | { readonly from: 'reference'; readonly reference: LengthReference }
  | { readonly from: 'template'; readonly override: CardReading | null };

/** Where K (or a measured deduction) comes from for one bend, when a person overrules the usual order of sources. */
export type BendOverride =
  | { readonly kind: 'kFactor'; readonly kFactor: number; readonly reason: string }
  | {
      readonly kind: 'deduction';
      readonly deductionMm: number;
      readonly reference: LengthReference;
      readonly reason: string;
    };

export interface BendDeclaration {
  readonly id: string;
  /** Mold line (crease) in layout coordinates; crosses the sheet from edge to edge. */
  readonly line: { readonly from: Point; readonly to: Point };
  /** Rotation away from flat: 0 = flat, 90 = square, 180 = hem. */
  readonly bendAngleDeg: number;
  /** Seen with face A showing. */
  readonly direction: BendDirection;
  readonly lengths: BendLengths;
  /** Explicit inside radius; null = what the stock's tooling delivers. */
  readonly insideRadiusMm: number | null;
  readonly override: BendOverride | null;
  /** How oblique side edges cross the bend zone. */
  readonly sideEdges: 'trimmed' | 'blended';
}

export interface ReliefSettings {
  readonly mode: 'automatic' | 'none';
  /** Null = the rule of the material (width at least 1T, depth R + T past the tangent line). */
  readonly widthMm: number | null;
  readonly depthMm: number | null;
  readonly shape: 'obround' | 'rectangular';
}

/** Everything geometric that a person places. Panels are derived from it, never stored. */
export interface Layout {
  readonly outer: OutlineLoop;
  readonly cutouts: readonly OutlineLoop[];
  readonly features: readonly Feature[];
  readonly bends: readonly BendDeclaration[];
  readonly reliefs: ReliefSettings;
  /** A point inside the panel that stays put. */
  readonly baseAnchor: Point;
}
