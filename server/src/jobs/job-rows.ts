import type { Job as JobAnswer } from '@foldwright/shared/contracts/photos';
import { jobSchema } from '@foldwright/shared/contracts/photos';
import type { TraceStage } from '@foldwright/shared/fitting/trace';
import { TRACE_STAGES } from '@foldwright/shared/fitting/trace';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { Job } from '../models/job';
import type { Queue } from './queue';

export type JobStages = JobAnswer['stages'];
export type JobFailure = NonNullable<JobAnswer['failure']>;

export const freshStages = (): JobStages => TRACE_STAGES.map((stage) => ({ stage, state: 'to-come', note: '' }));

/** Stages after one of them began: all before it are done, and the last of those has the note. */
export function stagesAt(stages: JobStages, begun: TraceStage, note: string): JobStages {
  const at = TRACE_STAGES.indexOf(begun);
  return stages.map((entry, index) => {
    if (index < at) return { ...entry, state: 'done', note: index === at - 1 && note !== '' ? note : entry.note };
    return { ...entry, state: index === at ? 'running' : 'to-come' };
  });
}

export const stagesDone = (stages: JobStages): JobStages => stages.map((entry) => ({ ...entry, state: 'done' }));
export const readStages = (stored: unknown): JobStages => jobSchema.shape.stages.parse(stored);

/** Tell the pages that show this job. */
export const tellJob = (scope: WorkshopScope, job: Job): Promise<void> =>
  recordEvent(scope, { kind: 'job-changed', jobId: job.id, photoId: job.photoId, partId: job.partId });

/** Put a job of reading a photo into the workshop and the queue, in the caller's transaction. */
export async function enqueueTrace(
  scope: WorkshopScope,
  queue: Queue,
  photo: { readonly id: string; readonly partId: string },
  now: Date,
): Promise<Job> {
  const job = await scope.rows.jobs.add({
    kind: 'trace',
    state: 'waiting',
    stages: freshStages(),
    photoId: photo.id,
    partId: photo.partId,
    createdAt: now,
    updatedAt: now,
  });
  await sendTrace(scope, queue, job);
  return job;
}

/** Send a job that waits to the queue. */
export async function sendTrace(scope: WorkshopScope, queue: Queue, job: Job): Promise<void> {
  const data = { workshopId: scope.workshopId, jobId: job.id };
  const queueJobId = await queue.enqueue(scope.transaction, 'trace', data);
  await scope.rows.jobs.change(job, { queueJobId });
  await tellJob(scope, job);
}
