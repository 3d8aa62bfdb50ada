import net from 'node:net';

/** Whether nothing listens on this port of the loopback address. */
export function isPortFree(port) {
  return new Promise((resolve) => {
    const server = net.createServer();
    server.once('error', () => resolve(false));
    server.listen(port, '127.0.0.1', () => server.close(() => resolve(true)));
  });
}

/** A port of the loopback address that nothing listens on. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}

/** The first of the ports wished for that is free, else any free one. */
export async function portNear(...wishes) {
  for (const wish of wishes) if (wish !== undefined && (await isPortFree(wish))) return wish;
  return freePort();
}

/** Whether something accepts connections on this port of the loopback address. */
export function answersOn(port, patienceMs = 1000) {
  return new Promise((resolve) => {
    const socket = net.connect({ host: '127.0.0.1', port });
    const settle = (answer) => {
      socket.destroy();
      resolve(answer);
    };
    socket.once('connect', () => settle(true));
    socket.once('error', () => settle(false));
    socket.setTimeout(patienceMs, () => settle(false));
  });
}
