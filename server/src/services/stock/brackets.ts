import type { BracketRef, Drawing } from '@foldwright/shared/contracts/stock';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Member } from '../../http/visitor';
import { BRACKET_HEAD, presentBracket } from '../../presenters/stock';
import { readStoredDocument } from '../stored-document';

/** References to released brackets by the id of their revision, for as many as there are. */
export async function bracketsById(
  scope: WorkshopScope,
  revisionIds: readonly string[],
): Promise<ReadonlyMap<string, BracketRef>> {
  const revisions = await scope.rows.revisions.list({
    where: { id: [...new Set(revisionIds)] },
    attributes: BRACKET_HEAD,
  });
  const parts = new Map(
    (await scope.rows.parts.list({ where: { id: revisions.map(({ partId }) => partId) } })).map((part) => [
      part.id,
      part,
    ]),
  );
  return new Map(
    revisions.flatMap((revision) => {
      const part = parts.get(revision.partId);
      return part === undefined ? [] : [[revision.id, presentBracket(revision, part)] as const];
    }),
  );
}

/** What revisions look like, each once. */
export async function drawingsOf(scope: WorkshopScope, revisionIds: readonly string[]): Promise<Drawing[]> {
  const revisions = await scope.rows.revisions.list({
    where: { id: [...new Set(revisionIds)] },
    attributes: ['id', 'document'],
  });
  return revisions.map(({ id, document }) => ({ revisionId: id, document: readStoredDocument(document) }));
}

/** Every released revision of the workshop, by part and the newest of each first. */
export function listReleasedBrackets(database: Database, { workshopId }: Member): Promise<BracketRef[]> {
  return database.viewWorkshop(workshopId, async (scope) => {
    const revisions = await scope.rows.revisions.list({ attributes: BRACKET_HEAD });
    const positions = new Map(revisions.map(({ id, position }) => [id, position]));
    const all = [
      ...(
        await bracketsById(
          scope,
          revisions.map(({ id }) => id),
        )
      ).values(),
    ];
    const age = ({ revisionId }: BracketRef) => positions.get(revisionId) ?? 0;
    return all.sort((a, b) => a.partNumber.localeCompare(b.partNumber, 'en', { numeric: true }) || age(b) - age(a));
  });
}
