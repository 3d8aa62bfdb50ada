import type { Photo } from '@foldwright/shared/contracts/photos';
import type { TemplateKind } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import { acceptPhoto } from '../files/accept-photo';
import type { FileStore } from '../files/file-store';
import { Problem } from '../http/problem';
import type { UploadedFile } from '../files/uploaded-file';
import type { Member } from '../http/visitor';
import { enqueueTrace } from '../jobs/job-rows';
import type { Queue } from '../jobs/queue';
import { presentPhoto } from '../presenters/photos';
import { recordAudit } from './record-audit';

export interface PhotoFacts {
  readonly templateKind: TemplateKind;
  readonly templateThicknessMm: number;
  readonly rulerXMm: number;
  readonly rulerYMm: number;
}

/** @throws Problem `not-found`, `wrong-state` when the part has no open draft to take a trace */
async function refuseWithoutDraft(scope: WorkshopScope, partId: string): Promise<void> {
  const part = await scope.rows.parts.get(partId);
  const draft = await scope.rows.drafts.findOne({ partId: part.id, closedAt: null });
  if (draft !== null) return;
  throw new Problem('wrong-state', {
    detail: 'The part has no draft that a photo could go into.',
    kept: 'The photo was not stored.',
    next: 'Start the next draft, then add the photo.',
  });
}

/**
 * Keep a photo of a template and have it read. Photo, job and the queue's entry are stored together.
 * @throws Problem `not-found`, `wrong-state`, `file-type-not-taken`, `file-too-large`, `photo-refused`
 */
export async function uploadPhoto(
  { database, files, queue }: { database: Database; files: FileStore; queue: Queue },
  member: Member,
  partId: string,
  upload: UploadedFile,
  facts: PhotoFacts,
  now: Date,
): Promise<Photo> {
  await database.inWorkshop(member.workshopId, (scope) => refuseWithoutDraft(scope, partId));
  const accepted = await acceptPhoto(upload.path);
  const kept: string[] = [];
  try {
    const originalStoredAs = await files.keep(member.workshopId, accepted.extension, upload.path);
    kept.push(originalStoredAs);
    const displayStoredAs = await files.put(member.workshopId, 'jpg', accepted.displayJpeg);
    kept.push(displayStoredAs);
    return await database.inWorkshop(member.workshopId, async (scope) => {
      await refuseWithoutDraft(scope, partId);
      const part = await scope.rows.parts.get(partId);
      const photo = await scope.rows.photos.add({
        partId,
        fileName: upload.originalName,
        mediaType: accepted.mediaType,
        byteLength: upload.byteLength,
        ...facts,
        widthPx: accepted.widthPx,
        heightPx: accepted.heightPx,
        originalStoredAs,
        displayStoredAs,
        uploadedBy: member.userId,
        uploadedAt: now,
      });
      await scope.rows.parts.change(part, { updatedAt: now });
      await recordAudit(scope, member, `Added the photo ${upload.originalName}`, `${part.number} ${part.name}`);
      const job = await enqueueTrace(scope, queue, photo, now);
      recordEvent(scope, { kind: 'part-changed', partId });
      return presentPhoto(photo, job, () => member.userName);
    });
  } catch (error) {
    await Promise.all(kept.map((storedAs) => files.remove(storedAs)));
    throw error;
  }
}
