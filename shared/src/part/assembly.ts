import type { Point, Point3 } from '../geometry/point';

/**
 * A simple solid near the part that it must clear. Its frame is the formed part's (see `bending/fold.ts`): x and y as in the layout
 * about the base panel, z up from the base panel's face B. All mm.
 */
export type Neighbour =
  | { readonly kind: 'box'; readonly id: string; readonly name: string; readonly min: Point3; readonly max: Point3 }
  | {
      readonly kind: 'cylinder';
      readonly id: string;
      readonly name: string;
      readonly from: Point3;
      readonly to: Point3;
      readonly radiusMm: number;
    };

/** Bolts that are fixed in the machine and must all enter the part's holes. */
export interface BoltsToMeet {
  /** Holes and slots of the part that the bolts go through. */
  readonly featureIds: readonly string[];
  /** How far a bolt may sit off its place, mm, about two standard deviations. */
  readonly placeHalfWidthMm: number;
  /** Wanted chance that all of them start, above 0 and below 1. */
  readonly wantedChance: number;
}

/** How the part is finished and what it meets where it is put on. */
export interface Assembly {
  /** Id of a finish of `stock/finishes`, for production. */
  readonly finishId: string;
  /** When threads are tapped and hardware is set: a mask is needed when that is before coating. */
  readonly hardwareSet: 'before-coating' | 'after-coating';
  /** What it bears on; null when nobody said. */
  readonly seat: {
    readonly material: 'steel' | 'stainless' | 'aluminium' | 'other';
    readonly isWet: boolean;
    /** Bends that turn round a corner of the seat, and the radius of that corner (0 = square), mm. */
    readonly corners: readonly { readonly bendId: string; readonly radiusMm: number }[];
  } | null;
  readonly neighbours: readonly Neighbour[];
  readonly bolts: BoltsToMeet | null;
}

/** Width of a capital over its height in the single-line lettering that lasers etch, gap included; common practice, no source. */
const LETTER_PITCH = 0.75;

/** Length of an etched text along its line, mm. */
export function markLengthMm({ text, heightMm }: Pick<Mark, 'text' | 'heightMm'>): number {
  return text.length * heightMm * LETTER_PITCH;
}

/** A short text etched on face A. */
export interface Mark {
  readonly id: string;
  readonly text: string;
  /** Lower left corner of the text, layout coordinates. */
  readonly at: Point;
  /** Height of a capital, mm. */
  readonly heightMm: number;
  readonly turnDeg: number;
}
