import { HttpErrorResponse } from '@angular/common/http';
import { ErrorHandler, Injectable, inject } from '@angular/core';
import { ApiProblem } from '../api/api-problem';
import { Notices } from '../api/notices';

/** What nobody caught: a failed request says what it says; a fault of the page is reported and owned up to. */
@Injectable()
export class PageErrorHandler extends ErrorHandler {
  private readonly notices = inject(Notices);

  override handleError(error: unknown): void {
    const cause = causeOf(error);
    if (cause instanceof ApiProblem || cause instanceof HttpErrorResponse) {
      this.notices.showProblem(cause);
      return;
    }
    super.handleError(error);
    this.notices.showFault();
  }
}

/** A rejected promise nobody waited for arrives wrapped. */
function causeOf(error: unknown): unknown {
  if (typeof error === 'object' && error !== null && 'rejection' in error) return error.rejection;
  if (error instanceof Error && error.cause !== undefined) return error.cause;
  return error;
}
