import * as z from 'zod/mini';
import { jobSchema } from './photos';
import { ROLES, defineRoute } from './route';
import { rowId, timestamp } from './scalars';

export const mailSchema = z.object({
  id: rowId,
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  state: z.enum(['waiting', 'sent', 'failed']),
  attempts: z.int(),
  lastError: z.nullable(z.string()),
  createdAt: timestamp,
  sentAt: z.nullable(timestamp),
});
export type Mail = z.output<typeof mailSchema>;

export const memberSchema = z.object({
  userId: rowId,
  name: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  revision: z.int(),
});

export const auditEntrySchema = z.object({
  id: rowId,
  at: timestamp,
  by: z.string(),
  what: z.string(),
  about: z.nullable(z.string()),
});

export const listMails = defineRoute({
  id: 'listMails',
  method: 'GET',
  path: '/api/office/mails',
  tag: 'office',
  access: ['owner', 'fabricator'],
  summary: 'Outgoing mail from our own outbox, newest first',
  answer: 'json',
  response: z.object({ mails: z.array(mailSchema) }),
  successStatus: 200,
});
export const listMembers = defineRoute({
  id: 'listMembers',
  method: 'GET',
  path: '/api/office/members',
  tag: 'office',
  access: ['owner', 'fabricator', 'viewer'],
  summary: 'Members of the workshop and their roles',
  answer: 'json',
  response: z.object({ members: z.array(memberSchema) }),
  successStatus: 200,
});
export const listAuditTrail = defineRoute({
  id: 'listAuditTrail',
  method: 'GET',
  path: '/api/office/audit',
  tag: 'office',
  access: ['owner'],
  summary: 'Who did what, newest first',
  answer: 'json',
  response: z.object({ entries: z.array(auditEntrySchema) }),
  successStatus: 200,
});
export const readInstallation = defineRoute({
  id: 'readInstallation',
  method: 'GET',
  path: '/api/operator/installation',
  tag: 'operator',
  access: ['operator'],
  summary: 'Workshops, queue, failed jobs and webhooks of this installation',
  answer: 'json',
  successStatus: 200,
  response: z.object({
    workshops: z.array(z.object({ id: rowId, name: z.string(), members: z.int(), parts: z.int() })),
    queues: z.array(z.object({ name: z.string(), waiting: z.int(), running: z.int(), failed: z.int() })),
    failedJobs: z.array(jobSchema),
    webhooks: z.object({ received: z.int(), refused: z.int() }),
    mails: z.object({ waiting: z.int(), sent: z.int(), failed: z.int() }),
  }),
});
