import type { readTroubles as contract } from '@foldwright/shared/contracts/operator';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import * as z from 'zod/mini';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import { Problem, notFound } from '../../http/problem';
import type { SignedInVisitor } from '../../http/visitor';
import { recordAudit } from '../record-audit';

type Troubles = RouteResponse<typeof contract>;
type Tools = Pick<AppDependencies, 'database' | 'queue' | 'now'>;

const MOST = 100;
const workRows = z.array(
  z.object({
    id: z.uuid(),
    queue: z.string(),
    workshop_name: z.nullable(z.string()),
    data: z.unknown(),
    error: z.nullable(z.string()),
    tries: z.int(),
    state: z.enum(['failed', 'retry']),
    at: z.date(),
  }),
);
const messageRows = z.array(
  z.object({
    id: z.uuid(),
    provider: z.enum(['payments', 'cutting']),
    kind: z.string(),
    error: z.string(),
    times: z.int(),
    last_at: z.date(),
  }),
);
const mailRows = z.array(
  z.object({
    id: z.uuid(),
    workshop_name: z.string(),
    recipient: z.string(),
    subject: z.string(),
    state: z.enum(['waiting', 'failed']),
    attempts: z.int(),
    last_error: z.nullable(z.string()),
    created_at: z.date(),
  }),
);
const workshopRow = z.object({ workshop_id: z.uuid() });
const aboutWork = z.object({ workshopId: z.optional(z.uuid()), task: z.optional(z.string()) });

const WORK = `
  SELECT j.id, j.name AS queue, w.name AS workshop_name, j.data, j.output->>'message' AS error, j.retry_count AS tries,
    j.state::text AS state, COALESCE(j.completed_on, j.started_on, j.created_on) AS at
  FROM pgboss.job j LEFT JOIN workshops w ON w.id::text = j.data->>'workshopId'
  WHERE j.state IN ('failed', 'retry') ORDER BY j.created_on DESC LIMIT ${MOST}`;
const MESSAGES = `
  SELECT id, provider, kind, error, times, last_at FROM failed_messages WHERE settled_at IS NULL
  ORDER BY last_at DESC LIMIT ${MOST}`;
const MAILS = `
  SELECT m.id, w.name AS workshop_name, m.recipient, m.subject, m.state, m.attempts, m.last_error, m.created_at
  FROM mails m JOIN workshops w ON w.id = m.workshop_id
  WHERE m.state = 'failed' OR (m.state = 'waiting' AND m.attempts > 0) ORDER BY m.created_at DESC LIMIT ${MOST}`;

/** What did not go through, of every workshop: work, messages, mail. */
export function readTroubles(database: Database): Promise<Troubles> {
  return database.asSystem('show the installation to its operator', async ({ select }) => ({
    work: workRows.parse(await select(WORK)).map((row) => {
      const about = z.safeParse(aboutWork, row.data);
      return {
        id: row.id,
        queue: row.queue,
        workshopName: row.workshop_name,
        what: (about.success ? about.data.task : undefined) ?? row.queue,
        error: row.error ?? 'no reason was kept',
        tries: row.tries,
        state: row.state === 'failed' ? ('failed' as const) : ('trying' as const),
        at: row.at.toISOString(),
      };
    }),
    messages: messageRows.parse(await select(MESSAGES)).map(({ last_at, ...row }) => ({
      ...row,
      at: last_at.toISOString(),
    })),
    mails: mailRows.parse(await select(MAILS)).map((row) => ({
      id: row.id,
      workshopName: row.workshop_name,
      to: row.recipient,
      subject: row.subject,
      state: row.state,
      attempts: row.attempts,
      lastError: row.last_error,
      at: row.created_at.toISOString(),
    })),
  }));
}

/** Put failed work back, to be done now. @throws Problem `not-found`, `wrong-state` when it has not failed */
export async function retryWork(
  { database, queue }: Tools,
  operator: SignedInVisitor,
  name: string,
  workId: string,
): Promise<void> {
  const [row] = await database.asSystem('show the installation to its operator', async ({ select }) =>
    select('SELECT state::text AS state, data FROM pgboss.job WHERE name = $1 AND id = $2', [name, workId]),
  );
  if (row === undefined) throw notFound();
  const { state, data } = z.object({ state: z.string(), data: z.unknown() }).parse(row);
  if (state !== 'failed') {
    throw new Problem('wrong-state', { detail: 'This work has not failed: it waits, runs or is done.' });
  }
  await queue.boss.retry(name, workId);
  const about = z.safeParse(aboutWork, data);
  const workshopId = about.success ? about.data.workshopId : undefined;
  if (workshopId === undefined) return;
  await database.inWorkshop(workshopId, (scope) =>
    recordAudit(scope, byOperator(operator), 'Tried failed work again', name),
  );
}

const byOperator = ({ user }: SignedInVisitor) => ({ userId: user.id, userName: `${user.name} (operator)` });

/** Try a mail again that could not be sent. @throws Problem `not-found`, `wrong-state` when it has not failed */
export async function sendMailAgain(
  { database, queue }: Tools,
  operator: SignedInVisitor,
  mailId: string,
): Promise<void> {
  const [found] = await database.asSystem('show the installation to its operator', async ({ select }) =>
    select('SELECT workshop_id FROM mails WHERE id = $1', [mailId]),
  );
  if (found === undefined) throw notFound();
  const { workshop_id: workshopId } = workshopRow.parse(found);
  await database.inWorkshop(workshopId, async (scope) => {
    const mail = await scope.rows.mails.get(mailId, { lock: true });
    if (mail.state !== 'failed') {
      throw new Problem('wrong-state', { detail: 'This mail was sent, or waits for its next try.' });
    }
    await scope.rows.mails.change(mail, { state: 'waiting', attempts: 0 });
    await queue.enqueue(scope.transaction, 'mail', { workshopId, mailId });
    await recordAudit(scope, byOperator(operator), 'Sent a mail again', mail.subject);
  });
}
