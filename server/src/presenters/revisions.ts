import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import type { RevisionDetail, RevisionSummary } from '@foldwright/shared/contracts/revisions';
import * as z from 'zod/mini';
import type { Part } from '../models/part';
import type { Revision } from '../models/revision';
import type { RevisionFile } from '../models/revision-file';
import type { NameOf } from '../services/names-of-people';
import { readStoredDocument } from '../services/stored-document';

/** Columns that a summary needs; the frozen tables are large and stay where they are. */
export type RevisionHead = Pick<
  Revision,
  'id' | 'partId' | 'letter' | 'hash' | 'note' | 'releasedAt' | 'releasedBy' | 'position'
>;
export const REVISION_HEAD = [
  'id',
  'partId',
  'letter',
  'position',
  'hash',
  'note',
  'releasedAt',
  'releasedBy',
] as const;

export function presentRevisionSummary(revision: RevisionHead, nameOf: NameOf): RevisionSummary {
  return {
    id: revision.id,
    partId: revision.partId,
    letter: revision.letter,
    hash: revision.hash,
    note: revision.note,
    releasedAt: revision.releasedAt.toISOString(),
    releasedBy: nameOf(revision.releasedBy),
  };
}

export function presentRevision(
  revision: Revision,
  part: Part,
  files: readonly RevisionFile[],
  nameOf: NameOf,
): RevisionDetail {
  // Both sheets and papers have a file of each kind; the list names each kind once, under the production sheet's name.
  const listed = files.filter((file) => file.stock === 'production' && file.paper !== 'Letter');
  return {
    ...presentRevisionSummary(revision, nameOf),
    partName: part.name,
    partNumber: part.number,
    document: readStoredDocument(revision.document),
    trial: z.parse(computedPartSchema, revision.computedTrial),
    production: z.parse(computedPartSchema, revision.computedProduction),
    rulesVersion: revision.rulesVersion,
    tablesVersion: revision.tablesVersion,
    files: listed.map(({ kind, fileName }) => ({ kind, fileName })),
  };
}
