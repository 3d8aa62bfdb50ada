import type { QueueName } from './queue';

/** One piece of work as the worker hands it out. */
export interface Work {
  /** What was enqueued; to be parsed. */
  readonly data: unknown;
  readonly queueJobId: string;
  readonly workerId: string;
  /** Fires when this process is about to end. */
  readonly signal: AbortSignal;
}

/**
 * Does the work of one queue. It may be called again for the same work at any time (a worker died, an answer got lost),
 * so it has to end in the same rows every time. Throwing means: again later, by the queue's rules.
 */
export interface WorkHandler {
  readonly queue: QueueName;
  /** How many pieces one worker process takes at once; 1 unless said otherwise. */
  readonly atOnce?: number;
  handle(work: Work): Promise<void>;
}
