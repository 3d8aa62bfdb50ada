import type { FakeSettings } from './fake-settings';
import { readFakeSettings } from './fake-settings';

/**
 * Run a stand-in as a program: one line on standard output tells where it listens, or one on standard error why it can't.
 * @param start answers that line once it listens
 */
export function runStandIn(start: (settings: FakeSettings) => Promise<string>): void {
  const run = async () => start(readFakeSettings(process.env));
  run().then(
    (line) => process.stdout.write(`${line}\n`),
    (error: unknown) => {
      process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
      process.exitCode = 1;
    },
  );
}
