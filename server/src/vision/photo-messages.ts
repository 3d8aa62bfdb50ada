import { TRACE_STAGES, type TraceRefusalCode, type TraceStage } from '@foldwright/shared/fitting/trace';
import type { PhotoReading } from './photo-reading';
import type { ReadingOptions } from './reading-options';

/** What the reader asks of its process. */
export interface ReadRequest {
  readonly bytes: Uint8Array;
  readonly options: ReadingOptions;
}

/** What the process answers: stages as they begin, then one of the other three. */
export type ReadAnswer =
  | { readonly kind: 'stage'; readonly stage: TraceStage }
  | { readonly kind: 'reading'; readonly reading: PhotoReading }
  | { readonly kind: 'refusal'; readonly code: TraceRefusalCode; readonly message: string }
  | { readonly kind: 'failure'; readonly message: string };

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}

/** Whether a message from the other process is a request. Both sides are this program: the shape alone is checked. */
export function isReadRequest(message: unknown): message is ReadRequest {
  return isObject(message) && message['bytes'] instanceof Uint8Array && isObject(message['options']);
}

/** Whether a message from the other process is an answer. */
export function isReadAnswer(message: unknown): message is ReadAnswer {
  if (!isObject(message)) return false;
  switch (message['kind']) {
    case 'stage':
      return TRACE_STAGES.some((stage) => stage === message['stage']);
    case 'reading':
      return isObject(message['reading']);
    case 'refusal':
      return typeof message['code'] === 'string' && typeof message['message'] === 'string';
    case 'failure':
      return typeof message['message'] === 'string';
    default:
      return false;
  }
}
