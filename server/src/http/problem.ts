import type { ProblemDetails, ProblemSlug } from '@foldwright/shared/contracts/problems';
import { PROBLEMS } from '@foldwright/shared/contracts/problems';

export interface ProblemWords {
  /** What happened, for the person who asked. */
  readonly detail: string;
  /** What was not lost. */
  readonly kept?: string;
  /** What to do now. */
  readonly next?: string;
  /** One entry for each thing that was wrong, with a JSON pointer into what was sent. */
  readonly errors?: readonly { readonly pointer: string; readonly detail: string }[];
  /** Members particular to the slug. */
  readonly extra?: unknown;
}

/** Why a request could not be done, fit to be shown. Services throw it; one middleware writes it as problem+json. */
export class Problem extends Error {
  constructor(
    readonly slug: ProblemSlug,
    readonly words: ProblemWords,
  ) {
    super(`${slug}: ${words.detail}`);
    this.name = 'Problem';
  }

  get status(): number {
    return PROBLEMS[this.slug].status;
  }

  /** @param instance path that was asked for */
  toDetails(instance: string, requestId: string): ProblemDetails {
    const { detail, kept, next, errors, extra } = this.words;
    return {
      type: `/problems/${this.slug}`,
      title: PROBLEMS[this.slug].title,
      status: this.status,
      detail,
      instance,
      requestId,
      ...(kept === undefined ? {} : { kept }),
      ...(next === undefined ? {} : { next }),
      ...(errors === undefined ? {} : { errors: [...errors] }),
      ...(extra === undefined ? {} : { extra }),
    };
  }
}

/** The one answer for rows that are missing and for rows of other workshops. */
export const notFound = (): Problem =>
  new Problem('not-found', { detail: 'It was never here, it was removed, or it belongs to another workshop.' });
