import type { Job } from '@foldwright/shared/contracts/photos';
import type { Database } from '../database/database';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { freshStages, sendTrace, tellJob } from '../jobs/job-rows';
import type { Queue } from '../jobs/queue';
import { presentJob } from '../presenters/photos';

interface Dependencies {
  readonly database: Database;
  readonly queue: Queue;
}

/** @throws Problem `not-found` */
export function readJob({ database }: Dependencies, member: Member, jobId: string): Promise<Job> {
  return database.inWorkshop(member.workshopId, async (scope) => presentJob(await scope.rows.jobs.get(jobId)));
}

/**
 * Stop a job that waits or runs; a worker that has it in hand finds out at its next stage and lets it go.
 * @throws Problem `not-found`; `wrong-state` when it has ended
 */
export function stopJob({ database, queue }: Dependencies, member: Member, jobId: string, now: Date): Promise<Job> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const job = await scope.rows.jobs.get(jobId, { lock: true });
    if (job.state !== 'waiting' && job.state !== 'running') {
      throw new Problem('wrong-state', { detail: 'This has ended already; there is nothing to stop.' });
    }
    if (job.queueJobId !== null && job.state === 'waiting') {
      await queue.cancel(scope.transaction, 'trace', job.queueJobId);
    }
    await scope.rows.jobs.change(job, { state: 'stopped', workerId: null, updatedAt: now });
    tellJob(scope, job);
    return presentJob(job);
  });
}

/**
 * Run a job again that failed or was stopped.
 * @throws Problem `not-found`; `wrong-state` when it is at work, done, or another reading of the photo is at work
 */
export function retryJob({ database, queue }: Dependencies, member: Member, jobId: string, now: Date): Promise<Job> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const job = await scope.rows.jobs.get(jobId, { lock: true });
    if (job.photoId !== null) await scope.rows.photos.get(job.photoId, { lock: true });
    const other = await scope.rows.jobs.findOne({ photoId: job.photoId, state: ['waiting', 'running'] });
    if ((job.state !== 'failed' && job.state !== 'stopped') || other !== null) {
      throw new Problem('wrong-state', { detail: 'Only a reading that failed or was stopped can be run again.' });
    }
    await scope.rows.jobs.change(job, {
      state: 'waiting',
      attempt: 0,
      failure: null,
      stages: freshStages(),
      updatedAt: now,
    });
    await sendTrace(scope, queue, job);
    return presentJob(job);
  });
}
