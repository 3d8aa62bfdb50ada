import { Injectable, signal } from '@angular/core';
import { type ApiProblem, problemFromError } from './api-problem';

/** Something to tell a person that belongs to no field of the page. */
export interface Notice {
  readonly tone: 'stop' | 'know';
  readonly title: string;
  readonly detail: string;
  readonly kept: string | null;
  readonly next: string | null;
  /** For the workshop's operator, when it broke on our side. */
  readonly requestId: string | null;
}

/** The one notice in view. The shell shows it; pages put it up. */
@Injectable({ providedIn: 'root' })
export class Notices {
  private readonly shown = signal<Notice | null>(null);

  readonly current = this.shown.asReadonly();

  /** Shows what a failed request says. Errors that are no failed request are thrown on: they are faults of the page. */
  showProblem(error: unknown): void {
    this.shown.set(noticeOf(problemFromError(error)));
  }

  /** Shows a sentence about something that went well or is worth knowing. */
  showNews(title: string, detail = ''): void {
    this.shown.set({ tone: 'know', title, detail, kept: null, next: null, requestId: null });
  }

  /** Owns up to a fault of the page itself. */
  showFault(): void {
    this.shown.set({
      tone: 'stop',
      title: 'This page stumbled',
      detail: 'Something in it broke that should not have.',
      kept: 'What was stored before is kept.',
      next: 'Load the page again, then repeat the last step.',
      requestId: null,
    });
  }

  dismiss(): void {
    this.shown.set(null);
  }
}

/** A problem as a notice. */
export function noticeOf(problem: ApiProblem): Notice {
  const { title, detail, kept, next, requestId } = problem.details;
  return {
    tone: 'stop',
    title,
    detail,
    kept: kept ?? null,
    next: next ?? null,
    requestId: problem.slug === 'internal' ? (requestId ?? null) : null,
  };
}
