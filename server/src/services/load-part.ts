import type { WorkshopScope } from '../database/workshop-scope';
import type { Job } from '../models/job';
import type { Part } from '../models/part';
import type { Photo } from '../models/photo';
import type { PartWithAll } from '../presenters/parts';
import { REVISION_HEAD } from '../presenters/revisions';
import type { NameOf } from './names-of-people';
import { namesOfPeople } from './names-of-people';

/** Photos with the latest reading of each. */
export async function withLatestJobs(
  scope: WorkshopScope,
  photos: readonly Photo[],
): Promise<{ photo: Photo; job: Job | null }[]> {
  const jobs = await scope.rows.jobs.list({
    where: { photoId: photos.map(({ id }) => id) },
    order: [['createdAt', 'ASC']],
  });
  const latest = new Map(jobs.map((job) => [job.photoId, job]));
  return photos.map((photo) => ({ photo, job: latest.get(photo.id) ?? null }));
}

/** A part with its open draft, its revisions and its photos, and the names of the people in them. */
export async function loadPart(scope: WorkshopScope, part: Part): Promise<{ row: PartWithAll; nameOf: NameOf }> {
  const draft = await scope.rows.drafts.findOne({ partId: part.id, closedAt: null });
  const revisions = await scope.rows.revisions.list({
    where: { partId: part.id },
    order: [['position', 'DESC']],
    attributes: REVISION_HEAD,
  });
  const photos = await withLatestJobs(
    scope,
    await scope.rows.photos.list({ where: { partId: part.id }, order: [['uploadedAt', 'DESC']] }),
  );
  const nameOf = await namesOfPeople(scope, [
    ...(draft === null ? [] : [draft.updatedBy]),
    ...revisions.map(({ releasedBy }) => releasedBy),
    ...photos.map(({ photo }) => photo.uploadedBy),
  ]);
  const otherHandPartId = part.otherHandOf ?? (await scope.rows.parts.findOne({ otherHandOf: part.id }))?.id ?? null;
  return { row: { part, draft, revisions, photos, otherHandPartId }, nameOf };
}
