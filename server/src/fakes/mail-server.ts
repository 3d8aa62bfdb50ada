import { readFakeSettings } from './fake-settings';
import { startMailServer } from './mail-server/start-mail-server';

/** Program: the local mail server. One line on standard output tells where it listens. */
void startMailServer(readFakeSettings(process.env)).then(
  (server) =>
    process.stdout.write(`mail-server listening on smtp://127.0.0.1:${server.smtpPort}, messages at ${server.url}\n`),
  (error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  },
);
