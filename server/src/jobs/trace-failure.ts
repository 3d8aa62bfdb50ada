import type { TraceRefusalCode } from '@foldwright/shared/fitting/trace';
import type { JobFailure } from './job-rows';

const KEPT = 'The photo is kept, and the part is as it was.';

type Words = Pick<JobFailure, 'detail' | 'next'>;

/** What to say for each reason why a photo can't be measured. */
const WORDS: Readonly<Record<TraceRefusalCode, Words>> = {
  notAPicture: {
    detail: 'The file is damaged: its picture can’t be opened.',
    next: 'Take the photo again, or copy it from the camera again.',
  },
  tooLarge: { detail: 'The picture has more than 50 megapixels.', next: 'Set the camera to a smaller size.' },
  noMarkers: {
    detail: 'None of the scale sheet’s markers are in the picture.',
    next: 'Lay the template on the printed scale sheet and show its whole edge.',
  },
  tooFewMarkers: {
    detail: 'Too few of the scale sheet’s markers can be seen.',
    next: 'Keep hands, shadows and the template off the markers, and show the whole sheet.',
  },
  mirroredPrint: {
    detail: 'The scale sheet is mirrored.',
    next: 'Print it without mirroring, and don’t use the front camera’s mirrored picture.',
  },
  blurred: { detail: 'The picture is not sharp enough.', next: 'Hold the camera still, tap to focus, add light.' },
  tooDark: { detail: 'The picture is too dark.', next: 'Add light from the side, without a hard shadow.' },
  sheetNotFlat: {
    detail: 'The scale sheet bulges: its markers don’t lie in one plane.',
    next: 'Tape the sheet down on something flat.',
  },
  noTemplate: {
    detail: 'There is no template to be told from the sheet.',
    next: 'Use the dark sheet for a light template and the light one for a dark template.',
  },
  templateOffSheet: {
    detail: 'The template reaches over the edge of the measured area.',
    next: 'Move it inside the markers, or use a larger sheet.',
  },
  twoTemplates: {
    detail: 'More than one thing lies on the sheet.',
    next: 'Leave only the template on it.',
  },
  tiltTooSteep: { detail: 'The picture was taken too much from the side.', next: 'Hold the camera above the sheet.' },
};

/** Words for the person whose photo was refused. */
export const failureOf = (code: TraceRefusalCode): JobFailure => ({ code, ...WORDS[code], kept: KEPT });

/** Words for a reading that broke on our side, or took its worker down, three times. */
export const FAILURE_ON_OUR_SIDE: JobFailure = {
  code: 'internal',
  detail: 'The reading broke off three times, on our side.',
  kept: KEPT,
  next: 'Try it once more; if it breaks again, tell the operator.',
};
