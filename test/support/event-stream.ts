import type { Server } from 'node:http';
import { createServer, get } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import { liveEventSchema } from '@foldwright/shared/contracts/system';
import type { Express } from 'express';
import { until } from './until';

/** An application on a port of its own. */
export interface Listening {
  readonly url: string;
  stop(): Promise<void>;
}

export async function listenTo(app: Express): Promise<Listening> {
  const server: Server = createServer(app).listen(0, '127.0.0.1');
  await new Promise((resolve) => server.once('listening', resolve));
  // An address is text only for sockets in the file system.
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}`,
    stop: () => {
      server.closeAllConnections();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
}

/** A page that listens to the live events. */
export class EventStream {
  readonly events: LiveEvent[] = [];
  text = '';
  status = 0;
  hasEnded = false;
  close: () => void = () => undefined;

  static async open(
    url: string,
    headers: { cookie: string; lastEventId?: number },
    path = '/api/events',
  ): Promise<EventStream> {
    const stream = new EventStream();
    const request = get(`${url}${path}`, {
      headers: {
        cookie: headers.cookie,
        ...(headers.lastEventId === undefined ? {} : { 'last-event-id': String(headers.lastEventId) }),
      },
    });
    stream.close = () => request.destroy();
    request.on('error', () => (stream.hasEnded = true));
    request.on('response', (response) => {
      stream.status = response.statusCode ?? 0;
      response.setEncoding('utf8');
      response.on('data', (chunk: string) => stream.take(chunk));
      response.on('close', () => (stream.hasEnded = true));
      response.on('error', () => (stream.hasEnded = true));
    });
    // The first comment says that the stream stands; what happens from now on is heard.
    await until(async () => (stream.text.includes(': here') || stream.hasEnded ? true : undefined));
    return stream;
  }

  private rest = '';

  private take(chunk: string): void {
    this.text += chunk;
    this.rest += chunk;
    const blocks = this.rest.split('\n\n');
    this.rest = blocks.pop() ?? '';
    for (const block of blocks) {
      const data = block.split('\n').find((line) => line.startsWith('data: '));
      if (data !== undefined) this.events.push(liveEventSchema.parse(JSON.parse(data.slice(6))));
    }
  }

  /** Wait until this many events have come. */
  async waitFor(count: number): Promise<LiveEvent[]> {
    return until(async () => (this.events.length >= count ? this.events : undefined));
  }
}
