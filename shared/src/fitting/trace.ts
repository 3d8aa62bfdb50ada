/** A point as traces carry it: [x, y], mm, in the scale sheet's page frame (origin lower left, y up). */
export type TracePoint = readonly [number, number];

export type TracePrimitive =
  | { readonly kind: 'line'; readonly from: TracePoint; readonly to: TracePoint }
  | {
      readonly kind: 'arc';
      readonly from: TracePoint;
      readonly to: TracePoint;
      readonly centre: TracePoint;
      readonly clockwise: boolean;
    };

/** How far a stretch of the boundary may be off; parallel to the primitives of `outer`. */
export interface BoundaryBand {
  readonly primitiveIndex: number;
  readonly halfWidthMm: number;
  readonly residualMm: number;
}

/** Outcome of reading one photo. The fixed interface of `cli -- trace`. */
export interface Trace {
  readonly units: 'mm';
  readonly frame: 'scale-sheet';
  readonly outer: readonly TracePrimitive[];
  readonly cutouts: readonly (readonly TracePrimitive[])[];
  readonly holes: readonly { readonly centre: TracePoint; readonly diameterMm: number }[];
  readonly slots: readonly { readonly from: TracePoint; readonly to: TracePoint; readonly widthMm: number }[];
  /** Half-width of the band that holds 95 % of the boundary. */
  readonly uncertaintyMm: number;
  readonly method: 'markers' | 'scan' | 'rectangle' | 'two-points';
  readonly pixelsPerMm: number;
  readonly markersUsed: number;
  readonly tiltDeg: number;
  readonly bands: readonly BoundaryBand[];
  /** What most of the uncertainty comes from, in plain words. */
  readonly mostlyFrom: string;
  readonly warnings: readonly string[];
  readonly timingsMs: Readonly<Record<string, number>>;
}

/** Stages of reading a photo, in order, as streamed to the page. */
export const TRACE_STAGES = ['decode', 'markers', 'square-up', 'template', 'outline', 'holes'] as const;
export type TraceStage = (typeof TRACE_STAGES)[number];

/** Why a photo was refused; each has words for the person in the presenter. */
export type TraceRefusalCode =
  | 'notAPicture'
  | 'tooLarge'
  | 'noMarkers'
  | 'tooFewMarkers'
  | 'mirroredPrint'
  | 'blurred'
  | 'tooDark'
  | 'sheetNotFlat'
  | 'noTemplate'
  | 'templateOffSheet'
  | 'twoTemplates'
  | 'tiltTooSteep';
