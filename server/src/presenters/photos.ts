import { templateKindSchema } from '@foldwright/shared/contracts/part-document-schema';
import type { Job as JobAnswer, Photo as PhotoAnswer } from '@foldwright/shared/contracts/photos';
import { jobSchema, photoSchema, traceSchema } from '@foldwright/shared/contracts/photos';
import * as z from 'zod/mini';
import type { Job } from '../models/job';
import type { Photo } from '../models/photo';
import type { NameOf } from '../services/names-of-people';

export function presentJob(job: Job): JobAnswer {
  return {
    id: job.id,
    kind: job.kind,
    state: job.state,
    stages: jobSchema.shape.stages.parse(job.stages),
    failure: jobSchema.shape.failure.parse(job.failure),
    attempt: job.attempt,
    updatedAt: job.updatedAt.toISOString(),
  };
}

/** @param job the latest reading of the photo */
export function presentPhoto(photo: Photo, job: Job | null, nameOf: NameOf): PhotoAnswer {
  return {
    id: photo.id,
    partId: photo.partId,
    fileName: photo.fileName,
    templateKind: templateKindSchema.parse(photo.templateKind),
    templateThicknessMm: photo.templateThicknessMm,
    widthPx: photo.widthPx,
    heightPx: photo.heightPx,
    uploadedAt: photo.uploadedAt.toISOString(),
    uploadedBy: nameOf(photo.uploadedBy),
    job: job === null ? null : presentJob(job),
    trace: z.parse(z.nullable(traceSchema), photo.trace),
    rectified: photoSchema.shape.rectified.parse(photo.rectified),
  };
}
