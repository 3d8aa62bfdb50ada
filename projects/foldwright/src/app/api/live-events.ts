import { Injectable, InjectionToken, inject } from '@angular/core';
import { type LiveEvent, liveEventSchema, streamEvents } from '@foldwright/shared/contracts/system';
import { Observable, Subject, share } from 'rxjs';
import * as z from 'zod/mini';

/** How the stream is opened; a test puts its own in. */
export const EVENT_SOURCE_FACTORY = new InjectionToken<(url: string) => EventSource>('EVENT_SOURCE_FACTORY', {
  providedIn: 'root',
  factory: () => (url) => new EventSource(url),
});

const KINDS = [
  'draft-changed',
  'part-changed',
  'job-changed',
  'order-changed',
  'stock-changed',
  'sale-changed',
  'question-changed',
  'mail-changed',
  'members-changed',
] as const satisfies readonly LiveEvent['kind'][];
const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 15000;

/**
 * What changes in the workshop, as it happens: one stream per browser tab, however many pages listen. The browser resumes
 * a broken stream where it stopped; one that the server ended is opened anew, and `resumed` tells pages to read again.
 */
@Injectable({ providedIn: 'root' })
export class LiveEvents {
  private readonly open = inject(EVENT_SOURCE_FACTORY);
  private readonly resumedSubject = new Subject<void>();
  private readonly restartSubject = new Subject<void>();

  /** Emits when the stream was opened anew and something may have been missed. */
  readonly resumed: Observable<void> = this.resumedSubject.asObservable();

  /** Every event of the current workshop, while anybody listens. */
  readonly events: Observable<LiveEvent> = new Observable<LiveEvent>((subscriber) => {
    let source: EventSource | null = null;
    let timer: ReturnType<typeof setTimeout> | null = null;
    let waitMs = FIRST_WAIT_MS;
    let openedBefore = false;

    const receive = (message: MessageEvent<unknown>): void => {
      const event = readLiveEvent(message.data);
      if (event !== null) subscriber.next(event);
    };
    const connect = (): void => {
      timer = null;
      source = this.open(streamEvents.path);
      source.onmessage = receive;
      for (const kind of KINDS) source.addEventListener(kind, receive);
      source.onopen = () => {
        if (openedBefore) this.resumedSubject.next();
        openedBefore = true;
        waitMs = FIRST_WAIT_MS;
      };
      source.onerror = () => {
        // The browser reconnects by itself unless it has closed the stream.
        if (source === null || source.readyState !== EventSource.CLOSED) return;
        disconnect();
        timer = setTimeout(connect, waitMs);
        waitMs = Math.min(waitMs * 2, LONGEST_WAIT_MS);
      };
    };
    const disconnect = (): void => {
      source?.close();
      source = null;
    };
    const restart = this.restartSubject.subscribe(() => {
      if (timer !== null) clearTimeout(timer);
      disconnect();
      connect();
    });

    connect();
    return () => {
      restart.unsubscribe();
      if (timer !== null) clearTimeout(timer);
      disconnect();
    };
  }).pipe(share());

  /** Opens the stream anew, because another workshop is the current one now. */
  restart(): void {
    this.restartSubject.next();
  }
}

/** Parses what the stream carried; an event of a kind this page doesn't know is passed over. */
export function readLiveEvent(data: unknown): LiveEvent | null {
  if (typeof data !== 'string') return null;
  try {
    const parsed = z.safeParse(liveEventSchema, JSON.parse(data));
    return parsed.success ? parsed.data : null;
  } catch {
    // A comment or half a message; the stream itself is sound, the next message stands for itself.
    return null;
  }
}
