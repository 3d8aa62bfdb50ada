import * as z from 'zod/mini';
import { computedPartSchema } from './development-schema';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { rowId, timestamp } from './scalars';

const fileKind = z.enum(['dxf', 'drawing', 'full-size-print', 'step']);

export const revisionSummarySchema = z.object({
  id: rowId,
  partId: rowId,
  letter: z.string(),
  /** SHA-256 over document, computed tables and rule versions: what an order refers to. */
  hash: z.string(),
  note: z.string(),
  releasedAt: timestamp,
  releasedBy: z.string(),
});
export type RevisionSummary = z.output<typeof revisionSummarySchema>;

export const revisionDetailSchema = z.object({
  ...revisionSummarySchema.shape,
  partName: z.string(),
  partNumber: z.string(),
  document: partDocumentSchema,
  trial: computedPartSchema,
  production: computedPartSchema,
  /** Versions of the rules and tables that were in force. */
  rulesVersion: z.string(),
  tablesVersion: z.string(),
  files: z.array(z.object({ kind: fileKind, fileName: z.string() })),
});
export type RevisionDetail = z.output<typeof revisionDetailSchema>;

const everyMember = ['owner', 'fabricator', 'viewer'] as const;
const revisionIdParams = z.strictObject({ revisionId: rowId });

export const readRevision = defineRoute({
  id: 'readRevision',
  method: 'GET',
  path: '/api/revisions/:revisionId',
  tag: 'revisions',
  access: everyMember,
  summary: 'A released revision with everything frozen in it',
  params: revisionIdParams,
  answer: 'json',
  response: revisionDetailSchema,
  successStatus: 200,
});
export const readRevisionFile = defineRoute({
  id: 'readRevisionFile',
  method: 'GET',
  path: '/api/revisions/:revisionId/files/:kind',
  tag: 'revisions',
  access: everyMember,
  summary: 'DXF, drawing, full-size print or STEP solid of a revision; solids are written soon after the release',
  params: z.strictObject({ revisionId: rowId, kind: fileKind }),
  query: z.strictObject({ stock: z.enum(['trial', 'production']), paper: z.optional(z.enum(['A4', 'Letter'])) }),
  answer: 'file',
  successStatus: 200,
});
