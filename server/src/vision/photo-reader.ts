import { type ChildProcess, fork } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import type { TraceStage } from '@foldwright/shared/fitting/trace';
import { isReadAnswer, type ReadAnswer } from './photo-messages';
import type { PhotoReading } from './photo-reading';
import type { ReadingOptions } from './reading-options';
import { TraceRefusal } from './trace-refusal';

export interface ReadControls {
  readonly onStage?: (stage: TraceStage) => void;
  readonly signal?: AbortSignal;
}

export interface PhotoReaderLimits {
  /** A photo that takes longer is given up, ms. */
  readonly timeLimitMs: number;
  /** Photos after which the process is replaced: native code is not trusted to give all its memory back. */
  readonly photosPerProcess: number;
}

const USUAL_LIMITS: PhotoReaderLimits = { timeLimitMs: 60_000, photosPerProcess: 50 };

/** The reading broke down: a crash, a time limit. Says nothing about the photo. */
export class PhotoReaderFailure extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'PhotoReaderFailure';
  }
}

/** Starts the bundled worker beside the bundled program, or the source with the loader used in development. */
function startProcess(): ChildProcess {
  const bundled = join(__dirname, 'photo-worker.cjs');
  // The environment holds passwords, and decoding strangers' pictures needs none of it.
  if (existsSync(bundled)) return fork(bundled, [], { serialization: 'advanced', env: {}, execArgv: [] });
  return fork(join(__dirname, 'photo-worker.ts'), [], {
    serialization: 'advanced',
    env: { TSX_TSCONFIG_PATH: join(__dirname, '..', '..', 'tsconfig.json') },
    execArgv: ['--require', require.resolve('tsx/cjs')],
  });
}

/**
 * Reads photos in a process of its own: one at a time, in the order asked. A crash there, a stop or the time limit ends
 * that process and nothing else; the next photo gets a new one.
 */
export class PhotoReader {
  private child: ChildProcess | null = null;
  private photosRead = 0;
  private last: Promise<unknown> = Promise.resolve();

  constructor(private readonly limits: PhotoReaderLimits = USUAL_LIMITS) {}

  /**
   * Reads one photo.
   *
   * @throws TraceRefusal when the photo cannot be read, in words for the person.
   * @throws PhotoReaderFailure when the reading broke down; trying again may help.
   * @throws the signal's reason when it is aborted.
   */
  read(bytes: Buffer, options: ReadingOptions, controls: ReadControls = {}): Promise<PhotoReading> {
    const turn = this.last.then(() => this.readNow(bytes, options, controls));
    this.last = turn.catch(() => undefined);
    return turn;
  }

  /** Ends the process, and with it a photo being read. */
  close(): void {
    this.discard();
  }

  private discard(): void {
    this.child?.kill('SIGKILL');
    this.child = null;
    this.photosRead = 0;
  }

  private process(): ChildProcess {
    if (this.photosRead >= this.limits.photosPerProcess || this.child?.connected === false) this.discard();
    // A killed process still reports when nobody is listening any more; unheard, that would end this one.
    this.child ??= startProcess().on('error', () => undefined);
    return this.child;
  }

  private async readNow(
    bytes: Buffer,
    options: ReadingOptions,
    { onStage, signal }: ReadControls,
  ): Promise<PhotoReading> {
    signal?.throwIfAborted();
    const child = this.process();
    child.ref();
    child.channel?.ref();
    try {
      const result = await new Promise<PhotoReading>((resolve, reject) => {
        const timer = setTimeout(() => {
          this.discard();
          settle(() => reject(new PhotoReaderFailure('reading the photo took too long')));
        }, this.limits.timeLimitMs);
        const onAbort = (): void => {
          this.discard();
          settle(() => reject(abortReason(signal)));
        };
        const onExit = (): void => {
          this.discard();
          settle(() => reject(new PhotoReaderFailure('the process that reads photos ended')));
        };
        const onError = (error: Error): void => {
          this.discard();
          settle(() => reject(new PhotoReaderFailure(error.message)));
        };
        const onMessage = (message: unknown): void => {
          if (!isReadAnswer(message)) return;
          if (message.kind === 'stage') onStage?.(message.stage);
          else settle(() => finish(message, resolve, reject));
        };
        const settle = (act: () => void): void => {
          clearTimeout(timer);
          signal?.removeEventListener('abort', onAbort);
          child.off('message', onMessage).off('exit', onExit).off('error', onError);
          act();
        };
        signal?.addEventListener('abort', onAbort, { once: true });
        child.on('message', onMessage).on('exit', onExit).on('error', onError);
        child.send({ bytes, options });
      });
      return result;
    } finally {
      this.photosRead++;
      child.unref();
      child.channel?.unref();
    }
  }
}

function abortReason(signal: AbortSignal | undefined): Error {
  const reason: unknown = signal?.reason;
  return reason instanceof Error ? reason : new Error('stopped');
}

function finish(
  answer: Exclude<ReadAnswer, { kind: 'stage' }>,
  resolve: (reading: PhotoReading) => void,
  reject: (error: Error) => void,
): void {
  if (answer.kind === 'reading') resolve(answer.reading);
  else if (answer.kind === 'refusal') reject(new TraceRefusal(answer.code, answer.message));
  else reject(new PhotoReaderFailure(answer.message));
}
