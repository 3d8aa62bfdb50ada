import type { Logger } from 'pino';
import * as z from 'zod/mini';
import type { TraceStage } from '@foldwright/shared/fitting/trace';
import { templateKindSchema } from '@foldwright/shared/contracts/part-document-schema';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { FileStore } from '../files/file-store';
import type { Job } from '../models/job';
import type { Photo } from '../models/photo';
import { TraceRefusal } from '../vision/trace-refusal';
import type { JobFailure } from './job-rows';
import { freshStages, stagesAt, stagesDone, tellJob } from './job-rows';
import type { PhotoReading, ReadsPhotos } from './photo-reader-port';
import { FAILURE_ON_OUR_SIDE, failureOf } from './trace-failure';
import type { WorkHandler } from './work-handler';

const dataSchema = z.object({ workshopId: z.uuid(), jobId: z.uuid() });
const MOST_ATTEMPTS = 3;

export interface TraceDependencies {
  readonly database: Database;
  readonly files: FileStore;
  readonly reader: ReadsPhotos;
  readonly logger: Logger;
  readonly now: () => Date;
}

interface Attempt {
  readonly workshopId: string;
  readonly jobId: string;
  /** Number of this try. A worker that was taken for dead and comes back carries an old number and changes nothing. */
  readonly attempt: number;
  readonly photo: Photo;
}

/** Reading of a photo by the worker. It may be begun again at any point; only the latest try may write. */
export function traceHandler(dependencies: TraceDependencies): WorkHandler {
  return {
    queue: 'trace',
    async handle({ data, workerId, signal }) {
      const { workshopId, jobId } = dataSchema.parse(data);
      const attempt = await begin(dependencies, workshopId, jobId, workerId);
      if (attempt === null) return;
      const stop = new AbortController();
      const whole = AbortSignal.any([signal, stop.signal]);
      try {
        await conclude(dependencies, attempt, await read(dependencies, attempt, stop, whole));
      } catch (error) {
        // Stopped by a person: the row says so already. By the end of this process: the queue gives it to another.
        if (stop.signal.aborted) return;
        if (error instanceof TraceRefusal) await fail(dependencies, attempt, failureOf(error.code));
        else if (signal.aborted || attempt.attempt < MOST_ATTEMPTS) throw error;
        else {
          dependencies.logger.error({ err: error, jobId }, 'a reading broke off for good');
          await fail(dependencies, attempt, FAILURE_ON_OUR_SIDE);
        }
      }
    },
  };
}

async function begin(
  { database, now }: TraceDependencies,
  workshopId: string,
  jobId: string,
  workerId: string,
): Promise<Attempt | null> {
  return database.inWorkshop(workshopId, async (scope) => {
    const job = await scope.rows.jobs.find(jobId, { lock: true });
    if (job === null || job.photoId === null || (job.state !== 'waiting' && job.state !== 'running')) return null;
    if (job.attempt >= MOST_ATTEMPTS) {
      // It took its worker down every time.
      await scope.rows.jobs.change(job, { state: 'failed', failure: FAILURE_ON_OUR_SIDE, updatedAt: now() });
      tellJob(scope, job);
      return null;
    }
    const attempt = job.attempt + 1;
    const stages = freshStages();
    await scope.rows.jobs.change(job, { state: 'running', attempt, workerId, stages, failure: null, updatedAt: now() });
    const photo = await scope.rows.photos.get(job.photoId);
    tellJob(scope, job);
    return { workshopId, jobId, attempt, photo };
  });
}

/** Run work on the job's row if this try still is the one that counts; answers whether it was. */
async function whileMine(
  { database }: TraceDependencies,
  { workshopId, jobId, attempt }: Attempt,
  work: (scope: WorkshopScope, job: Job) => Promise<void>,
): Promise<boolean> {
  return database.inWorkshop(workshopId, async (scope) => {
    const job = await scope.rows.jobs.find(jobId, { lock: true });
    if (job === null || job.state !== 'running' || job.attempt !== attempt) return false;
    await work(scope, job);
    return true;
  });
}

async function read(
  dependencies: TraceDependencies,
  attempt: Attempt,
  stop: AbortController,
  signal: AbortSignal,
): Promise<PhotoReading> {
  const { files, reader, now } = dependencies;
  const { photo } = attempt;
  const bytes = await files.read(photo.originalStoredAs);
  // Reports are written one after the other beside the reading, which doesn't wait for them.
  let reports: Promise<void> = Promise.resolve();
  let lost: unknown;
  const report = async (stage: TraceStage): Promise<void> => {
    const isMine = await whileMine(dependencies, attempt, async (scope, job) => {
      await scope.rows.jobs.change(job, { stages: stagesAt(stage), updatedAt: now() });
      tellJob(scope, job);
    });
    if (!isMine) stop.abort(new Error('The job was stopped or given to another worker.'));
  };
  const facts = {
    templateKind: templateKindSchema.parse(photo.templateKind),
    templateThicknessMm: photo.templateThicknessMm,
    printScaleX: photo.rulerXMm / 100,
    printScaleY: photo.rulerYMm / 100,
  };
  const onStage = (stage: TraceStage): void => {
    reports = reports.then(() => report(stage)).catch((error: unknown) => void (lost ??= error));
  };
  try {
    return await reader.read(bytes, facts, { onStage, signal });
  } finally {
    await reports;
    if (lost !== undefined) dependencies.logger.warn({ err: lost, jobId: attempt.jobId }, 'a stage was not reported');
  }
}

async function conclude(dependencies: TraceDependencies, attempt: Attempt, reading: PhotoReading): Promise<void> {
  const { files, now } = dependencies;
  const { jpeg, ...rectified } = reading.rectified;
  const rectifiedStoredAs = await files.put(attempt.workshopId, 'jpg', Buffer.from(jpeg));
  let replaced: string | null = null;
  const isMine = await whileMine(dependencies, attempt, async (scope, job) => {
    const photo = await scope.rows.photos.get(attempt.photo.id, { lock: true });
    replaced = photo.rectifiedStoredAs;
    await scope.rows.photos.change(photo, { trace: reading.trace, rectified, rectifiedStoredAs });
    const stages = stagesDone(reading.trace);
    await scope.rows.jobs.change(job, { state: 'done', stages, workerId: null, updatedAt: now() });
    tellJob(scope, job);
    recordEvent(scope, { kind: 'part-changed', partId: photo.partId });
  });
  const superfluous = isMine ? replaced : rectifiedStoredAs;
  if (superfluous !== null) await files.remove(superfluous);
}

async function fail(dependencies: TraceDependencies, attempt: Attempt, failure: JobFailure): Promise<void> {
  await whileMine(dependencies, attempt, async (scope, job) => {
    await scope.rows.jobs.change(job, { state: 'failed', failure, workerId: null, updatedAt: dependencies.now() });
    tellJob(scope, job);
  });
}
