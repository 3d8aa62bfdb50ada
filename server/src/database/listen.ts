import { Client } from 'pg';

export interface Listener {
  stop(): Promise<void>;
}

export interface ListenOptions {
  readonly url: string;
  readonly channel: string;
  readonly onNotice: (payload: string) => void;
  /** Called after every (re)connection: what was said in between has to be looked up. */
  readonly onConnected: () => void;
  readonly onError: (error: Error) => void;
}

const RECONNECT_MS = 1000;

/** Hear one channel of the database on a connection of its own; reconnects for as long as it is not stopped. */
export async function listen(options: ListenOptions): Promise<Listener> {
  let client: Client | undefined;
  let isStopped = false;
  let timer: NodeJS.Timeout | undefined;

  const reconnectLater = (error: Error): void => {
    client = undefined;
    if (isStopped) return;
    options.onError(error);
    timer ??= setTimeout(() => {
      timer = undefined;
      connect().catch(reconnectLater);
    }, RECONNECT_MS);
  };

  const connect = async (): Promise<void> => {
    const fresh = new Client({ connectionString: options.url, application_name: 'foldwright-listen', keepAlive: true });
    fresh.on('notification', ({ payload }) => options.onNotice(payload ?? ''));
    fresh.on('error', reconnectLater);
    fresh.on('end', () => {
      if (client === fresh) reconnectLater(new Error('The database ended the connection.'));
    });
    await fresh.connect();
    await fresh.query(`LISTEN ${fresh.escapeIdentifier(options.channel)}`);
    client = fresh;
    options.onConnected();
  };

  await connect();
  return {
    async stop() {
      isStopped = true;
      clearTimeout(timer);
      const last = client;
      client = undefined;
      await last?.end();
    },
  };
}
