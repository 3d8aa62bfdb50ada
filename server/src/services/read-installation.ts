import type { readInstallation as contract } from '@foldwright/shared/contracts/office';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import * as z from 'zod/mini';
import type { Database } from '../database/database';
import { presentJob } from '../presenters/photos';

type Installation = RouteResponse<typeof contract>;

const workshops = z.array(z.object({ id: z.string(), name: z.string(), members: z.int(), parts: z.int() }));
const queues = z.array(z.object({ name: z.string(), waiting: z.int(), running: z.int(), failed: z.int() }));
const figures = z.tuple([
  z.object({ received: z.int(), refused: z.int(), waiting: z.int(), sent: z.int(), failed: z.int() }),
]);

const WORKSHOPS = `
  SELECT w.id, w.name,
    (SELECT COUNT(*)::int FROM memberships m WHERE m.workshop_id = w.id) AS members,
    (SELECT COUNT(*)::int FROM parts p WHERE p.workshop_id = w.id) AS parts
  FROM workshops w ORDER BY w.name, w.id`;

const QUEUES = `
  SELECT q.name,
    (COUNT(*) FILTER (WHERE j.state IN ('created', 'retry')))::int AS waiting,
    (COUNT(*) FILTER (WHERE j.state = 'active'))::int AS running,
    (COUNT(*) FILTER (WHERE j.state = 'failed'))::int AS failed
  FROM pgboss.queue q LEFT JOIN pgboss.job j ON j.name = q.name GROUP BY q.name ORDER BY q.name`;

const FIGURES = `
  SELECT (SELECT COUNT(*)::int FROM webhook_events) AS received,
    (SELECT COALESCE(SUM(refused), 0)::int FROM webhook_refusals) AS refused,
    (SELECT COUNT(*)::int FROM mails WHERE state = 'waiting') AS waiting,
    (SELECT COUNT(*)::int FROM mails WHERE state = 'sent') AS sent,
    (SELECT COUNT(*)::int FROM mails WHERE state = 'failed') AS failed`;

const MOST_FAILED_JOBS = 50;

/** What the operator of this installation sees: counts of every workshop, and what has failed. No workshop's content. */
export function readInstallation(database: Database): Promise<Installation> {
  return database.asSystem('show the installation to its operator', async ({ select, models, transaction }) => {
    const [{ received, refused, ...mails }] = figures.parse(await select(FIGURES));
    const failedJobs = await models.jobs.findAll({
      where: { state: 'failed' },
      order: [['updatedAt', 'DESC']],
      limit: MOST_FAILED_JOBS,
      transaction,
    });
    return {
      workshops: workshops.parse(await select(WORKSHOPS)),
      queues: queues.parse(await select(QUEUES)),
      failedJobs: failedJobs.map(presentJob),
      webhooks: { received, refused },
      mails,
    };
  });
}
