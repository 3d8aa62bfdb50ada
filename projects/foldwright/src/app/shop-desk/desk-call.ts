import { inject, signal } from '@angular/core';
import { newIdempotencyKey } from '../api/api-client';
import { Notices } from '../api/notices';

/**
 * One thing done from a form at the desk: once under a key however often somebody presses, told in words when it fails.
 * A new key is made only after an answer, so that a try whose answer got lost is the same try.
 */
export class DeskCall {
  private readonly notices = inject(Notices);
  private readonly busy = signal(false);
  private key = newIdempotencyKey();

  readonly isBusy = this.busy.asReadonly();

  /** @returns what the call answered; undefined when it failed, which was told */
  async run<T>(call: (key: string) => Promise<T>): Promise<T | undefined> {
    if (this.busy()) return undefined;
    this.busy.set(true);
    try {
      return await call(this.key);
    } catch (error) {
      this.notices.showProblem(error);
      return undefined;
    } finally {
      this.key = newIdempotencyKey();
      this.busy.set(false);
    }
  }
}
