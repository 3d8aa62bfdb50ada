import { HttpErrorResponse, type HttpInterceptorFn } from '@angular/common/http';
import { Injectable, inject } from '@angular/core';
import { type Observable, Subject, tap } from 'rxjs';
import { problemFromError } from './api-problem';

/** Tells the shell that the server no longer knows who is asking. */
@Injectable({ providedIn: 'root' })
export class SignedOutWatch {
  private readonly subject = new Subject<void>();

  readonly signedOut: Observable<void> = this.subject.asObservable();

  report(): void {
    this.subject.next();
  }
}

/** Notices every answer that says "sign in first", whoever asked. */
export const watchForSignedOut: HttpInterceptorFn = (request, next) => {
  const watch = inject(SignedOutWatch);
  return next(request).pipe(
    tap({
      error: (error: unknown) => {
        if (error instanceof HttpErrorResponse && problemFromError(error).slug === 'not-signed-in') watch.report();
      },
    }),
  );
};
