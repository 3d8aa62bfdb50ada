import { developPart } from '@foldwright/shared/part/develop-part';
import { solidPlan } from '@foldwright/shared/solid/solid-plan';
import type { Database } from '../database/database';
import { recordEvent } from '../events/record-event';
import type { FileStore } from '../files/file-store';
import { makeSolids } from '../step/make-solids';
import type { ReleasedFile } from './released-file';
import { keepReleasedFile, releaseName } from './released-file';
import { readStoredDocument } from './stored-document';

const ROLES = ['trial', 'production'] as const;

/**
 * Write the STEP files of a revision, for both sheets, unless they are there. A sheet whose solid cannot be made gets none.
 * @throws SolidsFailure when the modeller broke down; trying again may help
 * @throws Problem `not-found`
 */
export async function writeSolids(
  database: Database,
  files: FileStore,
  { workshopId, revisionId }: { readonly workshopId: string; readonly revisionId: string },
): Promise<void> {
  const found = await database.viewWorkshop(workshopId, async (scope) => {
    const revision = await scope.rows.revisions.get(revisionId);
    const isThere = (await scope.rows.revisionFiles.count({ revisionId, kind: 'step' })) > 0;
    return { revision, part: await scope.rows.parts.get(revision.partId), isThere };
  });
  if (found.isThere) return;
  const { revision, part } = found;
  const document = readStoredDocument(revision.document);
  const name = releaseName(part, revision.letter);
  const solids = ROLES.flatMap((stock) => {
    const result = developPart(document, stock);
    return result.ok ? [{ stock, name: `${name} ${stock}`, plan: solidPlan(result.development) }] : [];
  });
  // Seconds, and no zone: the form that the standard's header has.
  const stamp = revision.releasedAt.toISOString().slice(0, 19);
  const answers = await makeSolids({ solids, stamp });
  const kept: ReleasedFile[] = [];
  for (const [index, answer] of answers.entries()) {
    const stock = solids[index]?.stock;
    if (!answer.ok || stock === undefined) continue;
    const bytes = Buffer.from(answer.step, 'latin1');
    kept.push(
      await keepReleasedFile(files, workshopId, { kind: 'step', stock, paper: 'none' }, `${name} ${stock}`, bytes),
    );
  }
  try {
    await database.inWorkshop(workshopId, async (scope) => {
      // A revision is frozen and takes no lock; its part does.
      await scope.rows.parts.get(part.id, { lock: true });
      if ((await scope.rows.revisionFiles.count({ revisionId, kind: 'step' })) > 0) throw new WrittenMeanwhile();
      for (const file of kept) await scope.rows.revisionFiles.add({ ...file, revisionId });
      recordEvent(scope, { kind: 'part-changed', partId: part.id });
    });
  } catch (error) {
    await Promise.all(kept.map(({ storedAs }) => files.remove(storedAs)));
    if (!(error instanceof WrittenMeanwhile)) throw error;
  }
}

/** Another worker was quicker. */
class WrittenMeanwhile extends Error {}
