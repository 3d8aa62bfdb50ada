import type { TraceRefusalCode } from '@foldwright/shared/fitting/trace';

/** A photo that cannot be read, with the reason as a code for the page and as one sentence for everywhere else. */
export class TraceRefusal extends Error {
  constructor(
    readonly code: TraceRefusalCode,
    message: string,
  ) {
    super(message);
    this.name = 'TraceRefusal';
  }
}
