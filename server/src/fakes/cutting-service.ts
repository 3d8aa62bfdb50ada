import { startCuttingService } from './cutting-service/start-cutting-service';
import { readFakeSettings } from './fake-settings';

/** Program: the invented cutting shop. One line on standard output tells where it listens. */
void startCuttingService(readFakeSettings(process.env)).then(
  (server) => process.stdout.write(`cutting-service listening on ${server.url}\n`),
  (error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  },
);
