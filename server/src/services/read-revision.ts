import type { RevisionDetail } from '@foldwright/shared/contracts/revisions';
import type { StockRole } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import type { FileStore } from '../files/file-store';
import type { FileAnswer } from '../http/file-answer';
import { notFound } from '../http/problem';
import type { Member } from '../http/visitor';
import { presentRevision } from '../presenters/revisions';
import { namesOfPeople } from './names-of-people';
import type { ReleasedFileKind } from './released-file';

/** @throws Problem `not-found` */
export function readRevision(database: Database, member: Member, revisionId: string): Promise<RevisionDetail> {
  return database.viewWorkshop(member.workshopId, async (scope) => {
    const revision = await scope.rows.revisions.get(revisionId);
    const part = await scope.rows.parts.get(revision.partId);
    const files = await scope.rows.revisionFiles.list({
      where: { revisionId },
      order: [
        ['kind', 'ASC'],
        ['stock', 'ASC'],
      ],
    });
    return presentRevision(revision, part, files, await namesOfPeople(scope, [revision.releasedBy]));
  });
}

export interface RevisionFileChoice {
  readonly kind: ReleasedFileKind;
  readonly stock: StockRole;
  /** Counts for the full-size print only; A4 when not said. */
  readonly paper?: 'A4' | 'Letter' | undefined;
}

/**
 * A file as it was written at release, byte for byte.
 * @throws Problem `not-found`
 */
export async function readRevisionFile(
  database: Database,
  files: FileStore,
  member: Member,
  revisionId: string,
  choice: RevisionFileChoice,
): Promise<FileAnswer> {
  const paper = choice.kind === 'full-size-print' ? (choice.paper ?? 'A4') : 'none';
  const { kind, stock } = choice;
  const row = await database.viewWorkshop(member.workshopId, (scope) =>
    scope.rows.revisionFiles.findOne({ revisionId, kind, stock, paper }),
  );
  if (row === null) throw notFound();
  return {
    bytes: await files.read(row.storedAs),
    contentType: row.contentType,
    fileName: row.fileName,
    disposition: row.contentType === 'application/pdf' ? 'inline' : 'attachment',
    isImmutable: true,
  };
}
