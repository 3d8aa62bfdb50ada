import { readFakeSettings } from './fake-settings';
import { startPaymentHost } from './payment-host/start-payment-host';

/** Program: the local payment host. One line on standard output tells where it listens. */
void startPaymentHost(readFakeSettings(process.env)).then(
  (server) => process.stdout.write(`payment-host listening on ${server.url}\n`),
  (error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  },
);
