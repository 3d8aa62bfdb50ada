import { inject, signal } from '@angular/core';
import { newIdempotencyKey } from './api-client';
import { problemFromError } from './api-problem';
import { Notices } from './notices';

/**
 * One thing done from a form: once under a key however often somebody presses, told in words when it fails. A new key is
 * made only after a definite answer, so that a try whose answer got lost is, pressed again, the same try.
 */
export class OnceCall {
  private readonly notices = inject(Notices);
  private readonly busy = signal(false);
  private key = newIdempotencyKey();

  readonly isBusy = this.busy.asReadonly();

  /** @returns what the call answered; undefined when it failed, which was told */
  async run<T>(call: (key: string) => Promise<T>): Promise<T | undefined> {
    if (this.busy()) return undefined;
    this.busy.set(true);
    try {
      const answer = await call(this.key);
      this.key = newIdempotencyKey();
      return answer;
    } catch (error) {
      this.notices.showProblem(error);
      if (isDefinite(problemFromError(error).status)) this.key = newIdempotencyKey();
      return undefined;
    } finally {
      this.busy.set(false);
    }
  }
}

/** Whether the server has said no: what it never answered, or stumbled over, may still have been done. */
const isDefinite = (status: number): boolean => status >= 400 && status < 500;
