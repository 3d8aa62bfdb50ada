import type { Photo } from '@foldwright/shared/contracts/photos';
import type { Database } from '../database/database';
import type { FileStore } from '../files/file-store';
import type { FileAnswer } from '../http/file-answer';
import { notFound } from '../http/problem';
import type { Member } from '../http/visitor';
import { presentPhoto } from '../presenters/photos';
import { withLatestJobs } from './load-part';
import { namesOfPeople } from './names-of-people';

/** @throws Problem `not-found` */
export function readPhoto(database: Database, member: Member, photoId: string): Promise<Photo> {
  return database.viewWorkshop(member.workshopId, async (scope) => {
    const photo = await scope.rows.photos.get(photoId);
    const [entry] = await withLatestJobs(scope, [photo]);
    return presentPhoto(photo, entry?.job ?? null, await namesOfPeople(scope, [photo.uploadedBy]));
  });
}

/**
 * The picture as it was taken (made anew: upright, without place or camera) or square to the sheet.
 * @throws Problem `not-found`, also for a rectified picture that is not made yet
 */
export async function readPhotoImage(
  database: Database,
  files: FileStore,
  member: Member,
  photoId: string,
  view: 'as-taken' | 'rectified',
): Promise<FileAnswer> {
  const photo = await database.viewWorkshop(member.workshopId, (scope) => scope.rows.photos.get(photoId));
  const storedAs = view === 'as-taken' ? photo.displayStoredAs : photo.rectifiedStoredAs;
  if (storedAs === null) throw notFound();
  return {
    bytes: await files.read(storedAs),
    contentType: 'image/jpeg',
    fileName: `${view}.jpg`,
    disposition: 'inline',
    // Another reading of the photo makes another rectified picture under the same address.
    isImmutable: view === 'as-taken',
  };
}
