import type { CardHinge } from '@foldwright/shared/bending/layout';
import { isSameJson } from '@foldwright/shared/part/canonical-json';
import type { TraceAnswers } from '@foldwright/shared/part/document-from-trace';
import type { Template, TemplateKind } from '@foldwright/shared/part/part-document';

/** Which face of the template shows in the photo, told by how its flanges fold. */
export type FaceShowing = 'inside' | 'outside';
/** Which face sits on the machine: the one that shows, or the one on the table. */
export type FaceBearing = 'showing' | 'hidden';
/** How the creases were made. */
export type CreaseKind = 'scored' | 'crushed' | 'half-cut';

/** What a photo can't tell; null = still open. */
export interface TemplateAnswers {
  readonly showing: FaceShowing | null;
  readonly bearing: FaceBearing | null;
  readonly crease: CreaseKind | null;
}

export const NOTHING_ANSWERED: TemplateAnswers = { showing: null, bearing: null, crease: null };

export interface CompleteAnswers {
  readonly showing: FaceShowing;
  readonly bearing: FaceBearing;
  readonly crease: CreaseKind;
}

/** All three answers, or null while one is open. */
export function completeAnswers({ showing, bearing, crease }: TemplateAnswers): CompleteAnswers | null {
  return showing === null || bearing === null || crease === null ? null : { showing, bearing, crease };
}

export const openQuestions = (answers: TemplateAnswers): number =>
  Object.values(answers).filter((answer) => answer === null).length;

/**
 * Where the card turns, as a depth below the face that shows. A scored board keeps the liner on the inside of the fold
 * whole, since the cut opens outwards; a crushed crease turns in the middle; a cut half through leaves the inner half,
 * which turns in its own middle.
 */
export function hingeOf(crease: CreaseKind, showing: FaceShowing, thicknessMm: number): CardHinge {
  switch (crease) {
    case 'scored':
      return { kind: 'liner', face: showing === 'inside' ? 'A' : 'B' };
    case 'crushed':
      return { kind: 'middle' };
    case 'half-cut':
      return { kind: 'depth', depthMm: thicknessMm * (showing === 'inside' ? 0.25 : 0.75) };
  }
}

/** The answers in the form in which a trace becomes a part document. */
export function traceAnswers(answers: CompleteAnswers, templateKind: TemplateKind, thicknessMm: number): TraceAnswers {
  return {
    templateKind,
    thicknessMm,
    showing: answers.showing,
    bearing: answers.bearing,
    hinge: hingeOf(answers.crease, answers.showing, thicknessMm),
    calibration: { scaleX: 1, scaleY: 1 },
  };
}

/** What was answered when the outline was taken, read back from the document; all open without a template. */
export function answersOf(template: Template | null): TemplateAnswers {
  if (template === null) return NOTHING_ANSWERED;
  const { reading, flangesFold, thicknessMm } = template;
  const showing: FaceShowing | null =
    flangesFold === undefined ? null : flangesFold === 'towards' ? 'inside' : 'outside';
  const creases: readonly CreaseKind[] = ['scored', 'crushed', 'half-cut'];
  const isSame = (hinge: CardHinge): boolean => isSameJson(hinge, reading.hinge);
  return {
    showing,
    bearing: reading.bearingFace === 'A' ? 'showing' : 'hidden',
    crease: showing === null ? null : (creases.find((crease) => isSame(hingeOf(crease, showing, thicknessMm))) ?? null),
  };
}
