import { z } from 'zod';

export const deliverySchema = z.object({
  id: z.string(),
  body: z.string(),
  /** Answers still wanted: 2 for an event that is delivered twice on purpose. */
  copiesLeft: z.number(),
  attempts: z.number(),
});
/** One callback on its way. It stays in the state until the other side said yes. */
export type Delivery = z.output<typeof deliverySchema>;

export interface CallbackSenderOptions {
  readonly url: string | null;
  /** First pause before another try, ms; it doubles each time up to a minute. */
  readonly retryMs: number;
  /** Headers for a body, signed at the moment of sending. */
  readonly headersFor: (body: string) => Record<string, string>;
  /** Called whenever the list of deliveries changed and ought to be saved. */
  readonly onChange: () => void;
}

const LONGEST_PAUSE_MS = 60_000;
const ANSWER_TIMEOUT_MS = 10_000;

/** Sends callbacks until each was answered with 2xx, across restarts, as services on the internet do. */
export class CallbackSender {
  private readonly timers = new Set<NodeJS.Timeout>();
  private isClosed = false;

  constructor(
    private readonly deliveries: Delivery[],
    private readonly options: CallbackSenderOptions,
  ) {}

  /** Take up again what an earlier run left undelivered. */
  resume(): void {
    for (const delivery of this.deliveries) this.schedule(delivery, 0);
  }

  send(delivery: Delivery, delayMs = 0): void {
    if (this.options.url === null) return;
    this.deliveries.push(delivery);
    this.options.onChange();
    this.schedule(delivery, delayMs);
  }

  close(): void {
    this.isClosed = true;
    for (const timer of this.timers) clearTimeout(timer);
    this.timers.clear();
  }

  private schedule(delivery: Delivery, delayMs: number): void {
    if (this.isClosed) return;
    const timer = setTimeout(() => {
      this.timers.delete(timer);
      void this.attempt(delivery);
    }, delayMs);
    this.timers.add(timer);
  }

  private async attempt(delivery: Delivery): Promise<void> {
    const isTaken = await this.post(delivery.body);
    if (this.isClosed) return;
    if (isTaken) {
      delivery.copiesLeft -= 1;
      delivery.attempts = 0;
      if (delivery.copiesLeft <= 0) this.deliveries.splice(this.deliveries.indexOf(delivery), 1);
      else this.schedule(delivery, this.options.retryMs);
    } else {
      delivery.attempts += 1;
      this.schedule(delivery, Math.min(this.options.retryMs * 2 ** (delivery.attempts - 1), LONGEST_PAUSE_MS));
    }
    this.options.onChange();
  }

  private async post(body: string): Promise<boolean> {
    if (this.options.url === null) return true;
    try {
      const answer = await fetch(this.options.url, {
        method: 'POST',
        headers: { 'content-type': 'application/json', ...this.options.headersFor(body) },
        body,
        signal: AbortSignal.timeout(ANSWER_TIMEOUT_MS),
      });
      await answer.arrayBuffer();
      return answer.ok;
    } catch {
      // Nobody listens there at the moment: the next try is the remedy.
      return false;
    }
  }
}
