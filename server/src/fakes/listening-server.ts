import http from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Express } from 'express';

/** A stand-in that listens on the loopback address. */
export interface ListeningServer {
  readonly port: number;
  readonly url: string;
  close(): Promise<void>;
}

/** Listen on loopback only; port 0 takes any free one. */
export function listenOnLoopback(app: Express, port: number): Promise<ListeningServer> {
  const server = http.createServer(app);
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      const address: AddressInfo | string | null = server.address();
      if (address === null || typeof address === 'string') throw new Error('the server has no port');
      resolve({
        port: address.port,
        url: `http://127.0.0.1:${address.port}`,
        close: () =>
          new Promise((done) => {
            server.close(() => done());
            server.closeAllConnections();
          }),
      });
    });
  });
}
