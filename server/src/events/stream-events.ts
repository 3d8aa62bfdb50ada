import { liveEventSchema } from '@foldwright/shared/contracts/system';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import type { Role } from '@foldwright/shared/contracts/route';
import type { Request, Response } from 'express';
import * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { LiveHub } from './live-hub';

const HEARTBEAT_MS = 15_000;
const RECONNECT_MS = 2_000;
const MOST_AT_ONCE = 500;

const rowsSchema = z.array(z.object({ seq: z.int(), payload: z.record(z.string(), z.unknown()) }));
const newestSchema = z.tuple([z.object({ seq: z.int() })]);

/** Whether somebody with this role gets to know of the event; customers see nothing of the workshop's work. */
export function mayHear(role: Role, event: LiveEvent): boolean {
  if (role === 'owner' || role === 'fabricator') return true;
  return role === 'viewer' && event.kind !== 'mail-changed';
}

export interface StreamOptions {
  readonly database: Database;
  readonly hub: LiveHub;
  /** Workshop and role of the listener; null for somebody in no workshop, who gets heartbeats only. */
  readonly listener: { readonly workshopId: string; readonly role: Role } | null;
  /** Asked at every heartbeat and when members change: whether the session still stands with the same role in the same workshop. */
  readonly stillAdmitted: () => Promise<boolean>;
  readonly onError: (error: unknown) => void;
  readonly heartbeatMs?: number;
}

async function newestSeq(database: Database, workshopId: string): Promise<number> {
  return database.inWorkshop(workshopId, async (scope) => {
    const rows = await scope.sql('SELECT COALESCE(MAX(seq), 0) AS seq FROM live_events');
    return newestSchema.parse(rows)[0].seq;
  });
}

async function eventsAfter(database: Database, workshopId: string, seq: number): Promise<LiveEvent[]> {
  return database.inWorkshop(workshopId, async (scope) => {
    const rows = await scope.sql('SELECT seq, payload FROM live_events WHERE seq > $1 ORDER BY seq LIMIT $2', [
      seq,
      MOST_AT_ONCE,
    ]);
    return rowsSchema.parse(rows).map((row) => liveEventSchema.parse({ ...row.payload, seq: row.seq }));
  });
}

/**
 * Keep a stream of server-sent events open: first what came after `Last-Event-ID`, then what happens, in order and
 * without gaps. Ends when the browser goes or the session does.
 */
export async function streamEvents(request: Request, response: Response, options: StreamOptions): Promise<void> {
  const { database, hub, listener, onError } = options;
  response.set({ 'Content-Type': 'text/event-stream; charset=utf-8', 'X-Accel-Buffering': 'no' });

  const newest = listener === null ? 0 : await newestSeq(database, listener.workshopId);
  const asked = /^\d{1,9}$/.exec(request.get('last-event-id') ?? '');
  // A number from the future belongs to another installation's past.
  let sent = asked === null ? newest : Math.min(Number(asked[0]), newest);

  let isOpen = true;
  let isPumping = false;
  let isWoken = false;
  const end = (): void => {
    if (!isOpen) return;
    isOpen = false;
    clearInterval(heartbeat);
    unsubscribe();
    response.end();
  };
  const pump = async (): Promise<void> => {
    isWoken = true;
    if (isPumping || listener === null) return;
    isPumping = true;
    try {
      while (isWoken && isOpen) {
        isWoken = false;
        const events = await eventsAfter(database, listener.workshopId, sent);
        for (const event of events) {
          // Who was removed or has another role now hears nothing more, not even this.
          if (event.kind === 'members-changed' && !(await options.stillAdmitted())) return end();
          sent = event.seq;
          if (isOpen && mayHear(listener.role, event))
            response.write(`id: ${sent}\ndata: ${JSON.stringify(event)}\n\n`);
        }
        if (events.length === MOST_AT_ONCE) isWoken = true;
      }
    } finally {
      isPumping = false;
    }
  };
  const wake = (): void => {
    pump().catch((error: unknown) => {
      onError(error);
      // The browser comes back and takes up where it stopped.
      end();
    });
  };
  const beat = async (): Promise<void> => {
    if (await options.stillAdmitted()) response.write(': here\n\n');
    else end();
  };

  const heartbeat = setInterval(() => {
    beat().catch((error: unknown) => {
      onError(error);
      end();
    });
  }, options.heartbeatMs ?? HEARTBEAT_MS);
  const unsubscribe = listener === null ? () => undefined : hub.subscribe(listener.workshopId, wake);
  response.once('close', end);
  response.write(`retry: ${RECONNECT_MS}\n: here\n\n`);
  response.flushHeaders();
  wake();
}
