import * as contracts from '@foldwright/shared/contracts/photos';
import type { AppDependencies } from '../app-dependencies';
import { makeScaleSheet } from '../documents/scale-sheet/scale-sheet';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { readPhoto, readPhotoImage } from '../services/read-photo';
import { rereadPhoto } from '../services/reread-photo';
import { readJob, retryJob, stopJob } from '../services/steer-job';
import { uploadPhoto } from '../services/upload-photo';

export function photoRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, files, now } = dependencies;
  return [
    bind(contracts.uploadPhoto, ({ actor, params, body, upload }) =>
      uploadPhoto(dependencies, actor, params.partId, upload, body, now()),
    ),
    bind(contracts.readPhoto, ({ actor, params }) => readPhoto(database, actor, params.photoId)),
    bind(contracts.readPhotoImage, ({ actor, params, query }) =>
      readPhotoImage(database, files, actor, params.photoId, query.view),
    ),
    bind(contracts.rereadPhoto, ({ actor, params, body }) =>
      rereadPhoto(dependencies, actor, params.photoId, body, now()),
    ),
    bind(contracts.readJob, ({ actor, params }) => readJob(dependencies, actor, params.jobId)),
    bind(contracts.stopJob, ({ actor, params }) => stopJob(dependencies, actor, params.jobId, now())),
    bind(contracts.retryJob, ({ actor, params }) => retryJob(dependencies, actor, params.jobId, now())),
    bind(contracts.readScaleSheet, async ({ query }) => ({
      bytes: await makeScaleSheet({ size: query.paper, variant: query.variant }),
      contentType: 'application/pdf',
      fileName: `Foldwright scale sheet ${query.paper} ${query.variant}.pdf`,
      disposition: 'inline',
      isImmutable: false,
    })),
  ];
}
