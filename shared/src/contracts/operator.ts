import * as z from 'zod/mini';
import { defineRoute } from './route';
import { rowId, timestamp } from './scalars';

/** Work of a queue that failed for good, or keeps failing. */
export const troubledWorkSchema = z.object({
  id: rowId,
  queue: z.string(),
  /** Null where the work names no workshop. */
  workshopName: z.nullable(z.string()),
  what: z.string(),
  error: z.string(),
  tries: z.int(),
  /** `failed`: nobody tries again by themselves. */
  state: z.enum(['failed', 'trying']),
  at: timestamp,
});
export type TroubledWork = z.output<typeof troubledWorkSchema>;

/** A message of an outside service that proved where it comes from and could not be handled. */
export const failedMessageSchema = z.object({
  id: rowId,
  provider: z.enum(['payments', 'cutting']),
  kind: z.string(),
  error: z.string(),
  times: z.int(),
  at: timestamp,
});
export type FailedMessage = z.output<typeof failedMessageSchema>;

export const troubledMailSchema = z.object({
  id: rowId,
  workshopName: z.string(),
  to: z.string(),
  subject: z.string(),
  state: z.enum(['waiting', 'failed']),
  attempts: z.int(),
  lastError: z.nullable(z.string()),
  at: timestamp,
});
export type TroubledMail = z.output<typeof troubledMailSchema>;

const operators = ['operator'] as const;

export const readTroubles = defineRoute({
  id: 'readTroubles',
  method: 'GET',
  path: '/api/operator/troubles',
  tag: 'operator',
  access: operators,
  summary: 'Work, messages and mail that did not go through',
  answer: 'json',
  response: z.object({
    work: z.array(troubledWorkSchema),
    messages: z.array(failedMessageSchema),
    mails: z.array(troubledMailSchema),
  }),
  successStatus: 200,
});
export const retryWork = defineRoute({
  id: 'retryWork',
  method: 'POST',
  path: '/api/operator/work/:queue/:workId/retry',
  tag: 'operator',
  access: operators,
  summary: 'Try failed work again now',
  params: z.strictObject({ queue: z.string().check(z.regex(/^[a-z-]{2,30}$/)), workId: rowId }),
  answer: 'empty',
  successStatus: 204,
  problems: ['wrong-state'],
});
export const replayMessage = defineRoute({
  id: 'replayMessage',
  method: 'POST',
  path: '/api/operator/messages/:messageId/replay',
  tag: 'operator',
  access: operators,
  summary: 'Handle a message again that could not be handled; one that was handled meanwhile changes nothing',
  params: z.strictObject({ messageId: rowId }),
  answer: 'empty',
  successStatus: 204,
});
export const sendMailAgain = defineRoute({
  id: 'sendMailAgain',
  method: 'POST',
  path: '/api/operator/mails/:mailId/send',
  tag: 'operator',
  access: operators,
  summary: 'Try a mail again now that could not be sent',
  params: z.strictObject({ mailId: rowId }),
  answer: 'empty',
  successStatus: 204,
  problems: ['wrong-state'],
});
