import type { Bounds, Point, Point3 } from '../geometry/point';
import type { Loop } from '../geometry/path';
import type { BendMeasurements } from './bend-measurements';
import type { BendDirection, HolePurpose, LengthReference } from './layout';

/** How far a value can be trusted: the same three words as the trade tables use. */
export type Confidence = 'published' | 'common-practice' | 'memory' | 'measured' | 'entered';

/** Where a number comes from, in words fit for a drawing. */
export interface Provenance {
  /** Short, for example "table by material, R/T 1 to 3" or "entered by hand: matched last batch". */
  readonly text: string;
  readonly source: string;
  readonly confidence: Confidence;
}

/** Range in which K of a material is expected to lie up to a ratio of inside radius to thickness. */
export interface KBand {
  /** The band holds for R/T below this (first match counts); null = for every larger ratio. */
  readonly ratioBelow: number | null;
  readonly low: number;
  readonly high: number;
  readonly source: string;
  readonly confidence: Confidence;
}

/** One row of a material's own table of K, for `ratioFrom` <= R/T < `ratioTo` (null = no upper end). */
export interface KTableRow {
  readonly ratioFrom: number;
  readonly ratioTo: number | null;
  readonly kFactor: number;
  readonly source: string;
  readonly confidence: Confidence;
}

/** Sheet and tooling that a development is computed for. Resolved from the document's stock by `stock/`. */
export interface BendingStock {
  readonly materialId: string;
  readonly materialName: string;
  readonly family: 'steel' | 'stainless' | 'aluminium' | 'copper' | 'brass' | 'other';
  readonly thicknessMm: number;
  readonly densityKgPerM3: number;
  /** Radius that the tooling delivers when a bend asks for none. */
  readonly deliveredRadiusMm: number;
  readonly vOpeningMm: number;
  readonly ultimateStrengthMpa: number;
  /** The material's own band of K, in ascending order of `ratioBelow`; empty when none is known. */
  readonly kBands: readonly KBand[];
  /** K by material; empty when there is no table, then DIN 6935 serves for steel and the textbook rule for the rest. */
  readonly kTable: readonly KTableRow[];
  /** Deductions measured for this sheet; absent when there are none. */
  readonly measurements?: BendMeasurements;
}

/** One row of the bend table. Every length in mm. */
export interface BendRow {
  readonly bendId: string;
  /** "B1", "B2", ... in document order. */
  readonly name: string;
  readonly bendAngleDeg: number;
  readonly direction: BendDirection;
  readonly insideRadiusMm: number;
  readonly kFactor: number;
  readonly kProvenance: Provenance;
  /** Said when K lies outside the material's own band, else null. */
  readonly kNote: string | null;
  readonly bendAllowanceMm: number;
  readonly bendDeductionMm: number;
  readonly deductionReference: LengthReference;
  /** Distance by which both subtrees approach each other compared with the layout (effective deduction, card included). */
  readonly layoutDeductionMm: number;
  readonly vOpeningMm: number;
  readonly bendLengthMm: number;
  readonly forceKn: number;
}

/** A bend in the flat pattern. `towardsChild` is the unit normal from the parent's side to the child's. */
export interface FlatBend {
  readonly bendId: string;
  readonly name: string;
  /** Middle of the bend zone, clipped to the sheet; several pieces when openings interrupt it. */
  readonly centreLines: readonly { readonly from: Point; readonly to: Point }[];
  readonly tangentLines: readonly { readonly from: Point; readonly to: Point }[];
  readonly direction: BendDirection;
  readonly bendAngleDeg: number;
  readonly insideRadiusMm: number;
  readonly bendAllowanceMm: number;
  readonly towardsChild: Point;
}

export interface FlatHole {
  readonly featureId: string;
  readonly centre: Point;
  readonly diameterMm: number;
  readonly purpose: HolePurpose;
}

export interface FlatSlot {
  readonly featureId: string;
  readonly from: Point;
  readonly to: Point;
  readonly widthMm: number;
}

/** The blank: what the laser cuts, face A up, the base panel where the layout has it. */
export interface FlatPattern {
  readonly outer: Loop;
  /** Free cut-outs; holes and slots stand apart so that their exact size is kept. */
  readonly cutouts: readonly Loop[];
  readonly holes: readonly FlatHole[];
  readonly slots: readonly FlatSlot[];
  readonly bends: readonly FlatBend[];
  readonly bounds: Bounds;
  /** Net of all openings. */
  readonly areaMm2: number;
  readonly cutLengthMm: number;
  readonly pierces: number;
  readonly massKg: number;
}

/** A place where a bend ends beside sheet that stays flat. */
export interface Relief {
  readonly bendId: string;
  /** `added` by the settings, or `missing` because reliefs are switched off. */
  readonly state: 'added' | 'missing';
  /** End of the bend's crease in the layout, and the matching corner of the bend zone in the flat pattern. */
  readonly layout: Point;
  readonly flat: Point;
  readonly widthMm: number;
  /** How far the relief reaches past the tangent line. */
  readonly depthMm: number;
}

/**
 * A rigid motion of the plane: turn by `turnDeg` (counter-clockwise) about the origin, then shift.
 */
export interface Placement {
  readonly turnDeg: number;
  readonly shift: Point;
}

/**
 * One bend zone of the flat pattern, with all that is needed to fold it: a strip between two parallel tangent lines
 * that joins two panels. A bend that opens several tabs has a zone for each.
 */
export interface BendZone {
  readonly bendId: string;
  readonly parentIndex: number;
  readonly childIndex: number;
  /** A point on the parent's tangent line, flat-pattern coordinates. */
  readonly origin: Point;
  /** Unit vector along the bend; `towardsChild` is this turned counter-clockwise by 90 degrees. */
  readonly along: Point;
  readonly towardsChild: Point;
  readonly bendAllowanceMm: number;
  readonly bendAngleDeg: number;
  readonly direction: BendDirection;
  readonly insideRadiusMm: number;
  readonly kFactor: number;
  /** By how much K may be off, as its source says: about two standard deviations. */
  readonly kHalfWidth: number;
  /** Boundary of the strip in flat-pattern coordinates, counter-clockwise, openings not taken out. */
  readonly outer: Loop;
}

/** A flat region between bends. `index` 0 is the base panel. */
export interface Panel {
  readonly index: number;
  readonly parentIndex: number | null;
  /** Bend towards the parent. */
  readonly bendId: string | null;
  /** Boundary in flat-pattern coordinates, between its tangent lines. */
  readonly outer: Loop;
  readonly openings: readonly Loop[];
  /** From layout to flat pattern; the base panel stays where it is. */
  readonly placement: Placement;
  /** The panel as drawn, up to its creases, in layout coordinates. */
  readonly layoutOuter: Loop;
}

/** Triangles for the screen. Positions xyz mm; normals unit; indices into them. */
export interface Mesh {
  readonly positions: readonly number[];
  readonly normals: readonly number[];
  readonly indices: readonly number[];
  /** Outline edges for scribed lines, pairs of xyz. */
  readonly edges: readonly number[];
}

/** Outer size of the fully formed part along the base panel's axes. */
export interface FormedBox {
  readonly min: Point3;
  readonly max: Point3;
}

/** A formed size a person can check with callipers. */
export interface FormedSize {
  readonly label: string;
  readonly valueMm: number;
  /** Half-width of the spread that is to be expected, mm, and what most of it comes from. */
  readonly spreadMm: number;
  readonly mostlyFrom: string;
}

/** Everything computed for one stock. */
export interface Development {
  readonly stock: BendingStock;
  readonly panels: readonly Panel[];
  /** One or more for each bend; a panel's zone towards its parent is the one whose `childIndex` is the panel's. */
  readonly zones: readonly BendZone[];
  readonly flat: FlatPattern;
  readonly bendTable: readonly BendRow[];
  readonly formedBox: FormedBox;
  readonly formedSizes: readonly FormedSize[];
  /** Holes, slots and cut-outs that reach into a bend zone. They are cut as drawn and may pull out of shape. */
  readonly featuresInBendZones: readonly string[];
  /** Ends of bend zones with sheet beside them on the same line: relieved, or left without relief. */
  readonly reliefs: readonly Relief[];
}

/** Why a layout cannot be developed. Names the offending things. */
export interface DevelopmentProblem {
  readonly code:
    | 'outlineNotSimple'
    | 'bendLineOutside'
    | 'bendLineEndsInside'
    | 'bendLinesCross'
    | 'panelRing'
    | 'bendTooClose'
    | 'angleOutOfRange'
    | 'radiusOutOfRange'
    | 'referenceNotAllowed'
    | 'kOutOfRange'
    | 'baseAnchorOutside'
    | 'stockUnknown'
    | 'holeUnknown';
  readonly message: string;
  readonly ids: readonly string[];
}

export type DevelopmentResult =
  | { readonly ok: true; readonly development: Development }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };
