import type { PartSummary } from '@foldwright/shared/contracts/parts';
import { Op } from 'sequelize';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import type { Member } from '../http/visitor';
import type { Part } from '../models/part';
import type { Revision } from '../models/revision';
import type { PartInList } from '../presenters/parts';
import { presentPartSummary } from '../presenters/parts';
import { REVISION_HEAD } from '../presenters/revisions';
import { withLatestJobs } from './load-part';
import { namesOfPeople } from './names-of-people';

/** Text as a pattern that matches it anywhere; its own wildcards are taken literally. */
const anywhere = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

async function latestRevisions(scope: WorkshopScope, parts: readonly Part[]): Promise<Map<string, Revision>> {
  const heads = await scope.rows.revisions.list({
    where: { partId: parts.map(({ id }) => id) },
    order: [['position', 'ASC']],
    attributes: ['id', 'partId'],
  });
  const newest = new Map(heads.map(({ partId, id }) => [partId, id]));
  const rows = await scope.rows.revisions.list({
    where: { id: [...newest.values()] },
    attributes: [...REVISION_HEAD, 'document'],
  });
  return new Map(rows.map((row) => [row.partId, row]));
}

/** The parts of the workshop by number, or those whose number or name holds the text. */
export function listParts(database: Database, member: Member, search: string | undefined): Promise<PartSummary[]> {
  return database.viewWorkshop(member.workshopId, async (scope) => {
    const text = search?.trim() ?? '';
    const like = { [Op.iLike]: anywhere(text) };
    const parts = await scope.rows.parts.list({
      ...(text === '' ? {} : { where: { [Op.or]: [{ name: like }, { number: like }] } }),
      order: [
        ['number', 'ASC'],
        ['id', 'ASC'],
      ],
    });
    const partIds = parts.map(({ id }) => id);
    const drafts = await scope.rows.drafts.list({ where: { partId: partIds, closedAt: null } });
    const draftOf = new Map(drafts.map((draft) => [draft.partId, draft]));
    const revisionOf = await latestRevisions(scope, parts);
    const photos = await scope.rows.photos.list({ where: { partId: partIds }, order: [['uploadedAt', 'ASC']] });
    const photoOf = new Map((await withLatestJobs(scope, photos)).map((entry) => [entry.photo.partId, entry]));
    const nameOf = await namesOfPeople(scope, [
      ...drafts.map(({ updatedBy }) => updatedBy),
      ...[...revisionOf.values()].map(({ releasedBy }) => releasedBy),
    ]);
    return parts.map((part) => {
      const revision = revisionOf.get(part.id);
      const row: PartInList = {
        part,
        draft: draftOf.get(part.id) ?? null,
        latest: revision === undefined ? null : { head: revision, document: revision.document },
        photo: photoOf.get(part.id) ?? null,
      };
      return presentPartSummary(row, nameOf);
    });
  });
}
