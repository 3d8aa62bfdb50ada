import type { Job as JobAnswer } from '@foldwright/shared/contracts/photos';
import type { Trace, TraceStage } from '@foldwright/shared/fitting/trace';
import { TRACE_STAGES } from '@foldwright/shared/fitting/trace';
import { formatDecimal } from '@foldwright/shared/units/length';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { Job } from '../models/job';
import type { Queue } from './queue';

export type JobStages = JobAnswer['stages'];
export type JobFailure = NonNullable<JobAnswer['failure']>;

export const freshStages = (): JobStages => TRACE_STAGES.map((stage) => ({ stage, state: 'to-come', note: '' }));

/** Stages after one of them began: all before it are done. */
export function stagesAt(begun: TraceStage): JobStages {
  const at = TRACE_STAGES.indexOf(begun);
  return TRACE_STAGES.map((stage, index) => ({
    stage,
    state: index < at ? 'done' : index === at ? 'running' : 'to-come',
    note: '',
  }));
}

const counted = (count: number, one: string, many: string): string => `${count} ${count === 1 ? one : many}`;

/** All stages done, each with what was found in it. */
export function stagesDone(trace: Trace): JobStages {
  const shapes = [...trace.outer, ...trace.cutouts.flat()];
  const openings = trace.holes.length + trace.slots.length + trace.cutouts.length;
  const notes: Readonly<Partial<Record<TraceStage, string>>> = {
    markers: counted(trace.markersUsed, 'marker', 'markers'),
    'square-up': `tilted by ${Math.round(trace.tiltDeg)}°`,
    template: `${formatDecimal(trace.pixelsPerMm, 1)} pixels for each mm`,
    outline: `${counted(shapes.length, 'line or arc', 'lines and arcs')}, ± ${formatDecimal(trace.uncertaintyMm, 2)} mm`,
    holes: counted(openings, 'opening', 'openings'),
  };
  return TRACE_STAGES.map((stage) => ({ stage, state: 'done', note: notes[stage] ?? '' }));
}

/** Tell the pages that show this job. */
export const tellJob = (scope: WorkshopScope, job: Job): void =>
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
  tellJob(scope, job);
}
