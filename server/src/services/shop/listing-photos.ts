import type { Listing as ListingContract } from '@foldwright/shared/contracts/shop';
import type { AppDependencies } from '../../app-dependencies';
import { acceptPhoto } from '../../files/accept-photo';
import type { UploadedFile } from '../../files/uploaded-file';
import { Problem, notFound } from '../../http/problem';
import type { FileAnswer } from '../../http/file-answer';
import type { Member } from '../../http/visitor';
import { findShop } from '../sales/find-by-link';
import { presentListing } from './present-listing';

const MOST_PHOTOS = 8;
type Tools = Pick<AppDependencies, 'database' | 'files'>;

/**
 * Add a photo to a listing: made anew, upright, without anything else the file carried.
 * @throws Problem `not-found`, `wrong-state`, `file-type-not-taken`, `file-too-large`, `photo-refused`
 */
export async function addListingPhoto(
  { database, files }: Tools,
  { workshopId }: Member,
  listingId: string,
  upload: UploadedFile,
  description: string,
): Promise<ListingContract> {
  const { displayJpeg } = await acceptPhoto(upload.path);
  const storedAs = await files.put(workshopId, 'jpg', displayJpeg);
  try {
    return await database.inWorkshop(workshopId, async (scope) => {
      const listing = await scope.rows.listings.get(listingId, { lock: true });
      const photos = await scope.rows.listingPhotos.list({ where: { listingId } });
      if (photos.length >= MOST_PHOTOS) {
        throw new Problem('wrong-state', {
          detail: `A listing shows up to ${MOST_PHOTOS} photos.`,
          kept: 'The listing is as it was.',
          next: 'Take one off first.',
        });
      }
      const position = Math.max(-1, ...photos.map((photo) => photo.position)) + 1;
      await scope.rows.listingPhotos.add({ listingId, position, description, storedAs, contentType: 'image/jpeg' });
      return presentListing(scope, listing);
    });
  } catch (error) {
    await files.remove(storedAs);
    throw error;
  }
}

/** Take a photo off a listing. @throws Problem `not-found` */
export async function removeListingPhoto(
  { database, files }: Tools,
  { workshopId }: Member,
  listingId: string,
  photoId: string,
): Promise<ListingContract> {
  const { listing, storedAs } = await database.inWorkshop(workshopId, async (scope) => {
    const row = await scope.rows.listings.get(listingId, { lock: true });
    const photo = await scope.rows.listingPhotos.findOne({ id: photoId, listingId });
    if (photo === null) throw notFound();
    await scope.rows.listingPhotos.remove(photo);
    return { listing: await presentListing(scope, row), storedAs: photo.storedAs };
  });
  // Only after commit: a file without a row is lost room, a row without its file a broken page.
  await files.remove(storedAs);
  return listing;
}

/** A photo of a listing that is published in a shop that is open. @throws Problem `not-found` */
export async function readShopPhoto(
  { database, files }: Tools,
  shopSlug: string,
  photoId: string,
): Promise<FileAnswer> {
  const workshopId = await findShop(database, shopSlug);
  const storedAs = await database.viewWorkshop(workshopId, async ({ rows }) => {
    const photo = await rows.listingPhotos.get(photoId);
    const listing = await rows.listings.get(photo.listingId);
    if (listing.state !== 'published') throw notFound();
    return photo.storedAs;
  });
  return {
    bytes: await files.read(storedAs),
    contentType: 'image/jpeg',
    fileName: 'photo.jpg',
    disposition: 'inline',
    isImmutable: true,
  };
}
