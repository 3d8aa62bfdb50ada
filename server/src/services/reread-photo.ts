import type { Photo } from '@foldwright/shared/contracts/photos';
import type { TemplateKind } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { enqueueTrace } from '../jobs/job-rows';
import type { Queue } from '../jobs/queue';
import { presentPhoto } from '../presenters/photos';
import { namesOfPeople } from './names-of-people';

/**
 * Read a photo again with other facts about its template. The trace it has stays until the new one is there.
 * @throws Problem `not-found`; `wrong-state` while it is being read
 */
export function rereadPhoto(
  { database, queue }: { database: Database; queue: Queue },
  member: Member,
  photoId: string,
  facts: { templateKind: TemplateKind; templateThicknessMm: number },
  now: Date,
): Promise<Photo> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const photo = await scope.rows.photos.get(photoId, { lock: true });
    const atWork = await scope.rows.jobs.findOne({ photoId, state: ['waiting', 'running'] });
    if (atWork !== null) {
      throw new Problem('wrong-state', {
        detail: 'The photo is being read already.',
        next: 'Wait for it, or stop it first.',
      });
    }
    await scope.rows.photos.change(photo, facts);
    const job = await enqueueTrace(scope, queue, photo, now);
    return presentPhoto(photo, job, await namesOfPeople(scope, [photo.uploadedBy]));
  });
}
