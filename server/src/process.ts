import pino from 'pino';
import type { Logger } from 'pino';
import { EnvironmentError } from './env';

/** The log of a process: lines of JSON on standard output, without anything that opens a door. */
export function openLog(level: string, name: string): Logger {
  return pino({
    level,
    base: { name, pid: process.pid },
    redact: ['*.password', '*.passwordHash', '*.csrfToken', '*.cookie', '*.authorization'],
  });
}

/**
 * Run a process until it is told to end: `start` answers what ends it. A setting that can't be used is told in words;
 * everything else that breaks the start is told whole. Either way the exit code is 1.
 */
export async function runProcess(start: () => Promise<{ stop: () => Promise<void>; logger: Logger }>): Promise<void> {
  try {
    const { stop, logger } = await start();
    let isEnding = false;
    const end = (signal: NodeJS.Signals): void => {
      if (isEnding) return;
      isEnding = true;
      logger.info({ signal }, 'ending');
      stop().then(
        () => process.exit(0),
        (error: unknown) => {
          logger.error({ err: error }, 'the end was not clean');
          process.exit(1);
        },
      );
    };
    for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, end);
  } catch (error) {
    tellFailure(error);
    process.exit(1);
  }
}

/** Say why a program can't do its work, on standard error. */
export function tellFailure(error: unknown): void {
  const isPlain = error instanceof EnvironmentError;
  const text = error instanceof Error ? (isPlain ? error.message : (error.stack ?? error.message)) : String(error);
  process.stderr.write(`${text}\n`);
}
