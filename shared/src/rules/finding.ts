import type { Point } from '../geometry/point';
import type { Provenance } from '../bending/development';
import type { PartCommand } from '../part/commands';

/** Shown as "Can't be made", "Check this", "Good to know". */
export type Severity = 'blocker' | 'caution' | 'hint';

export type RuleId =
  | 'flangeTooShort'
  | 'holeInBendZone'
  | 'missingRelief'
  | 'radiusBelowMinimum'
  | 'holeTooSmall'
  | 'landTooThin'
  | 'outlineCrossesItself'
  | 'cannotBeDeveloped'
  | 'declaredUse'
  | 'edgeInBendZone'
  | 'insideCornerTooSharp'
  | 'pieceDropsOut'
  | 'blankOutOfRange'
  | 'brakeTooSmall'
  | 'dieOpeningUnusual'
  | 'etchedText'
  | 'deliveredRadius'
  | 'seatCorner'
  | 'unitsSlip'
  | 'drawnTwice'
  | 'tinyEdge'
  | 'threadTooShort'
  | 'coatedTooSmall'
  | 'hardwareNeedsMask'
  | 'finishNotForMetal'
  | 'unlikeMetals'
  | 'washerNotSeated'
  | 'noRoomForFastener'
  | 'neighbourFouled'
  | 'boltsStart'
  | 'wrongHand'
  | 'bendOrder'
  | 'selfInterference';

/** A mend that one click applies; `label` is a verb phrase ("Move both 0.5 mm out"). */
export interface Mend {
  readonly label: string;
  readonly commands: readonly PartCommand[];
}

/** One result of the checks: what, where, why, how to mend. */
export interface Finding {
  /** Stable for the same rule and things, so that lists keep their rows. */
  readonly id: string;
  readonly rule: RuleId;
  readonly severity: Severity;
  /** One sentence that names the thing ("Hole H5 may pull oval"). */
  readonly title: string;
  /** What and where, with the numbers found and required. */
  readonly detail: string;
  readonly foundMm: number | null;
  readonly requiredMm: number | null;
  readonly why: Provenance;
  /** Ids of edges, features, bends concerned. */
  readonly ids: readonly string[];
  /** Where to point at, in layout and in flat-pattern coordinates. */
  readonly at: { readonly layout: Point; readonly flat: Point } | null;
  /** What to do about it, in words; always there. */
  readonly advice: string;
  readonly mend: Mend | null;
}
