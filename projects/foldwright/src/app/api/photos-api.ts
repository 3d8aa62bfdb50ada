import { Injectable, inject } from '@angular/core';
import {
  type Job,
  type Photo,
  readJob,
  readPhoto,
  readPhotoImage,
  readScaleSheet,
  rereadPhoto,
  retryJob,
  stopJob,
  uploadPhoto,
} from '@foldwright/shared/contracts/photos';
import type { RouteBody } from '@foldwright/shared/contracts/route';
import type { Observable } from 'rxjs';
import { ApiClient, type ApiRead, type UploadProgress } from './api-client';

export type PhotoFacts = RouteBody<typeof uploadPhoto>;

/** Photos of templates, their reading and the sheet that gives them their scale. */
@Injectable({ providedIn: 'root' })
export class PhotosApi {
  private readonly client = inject(ApiClient);

  /** Uploads a photo and starts its reading. Unsubscribing stops the upload. */
  upload(partId: string, facts: PhotoFacts, file: File): Observable<UploadProgress<Photo>> {
    return this.client.upload(uploadPhoto, { params: { partId }, body: facts }, file);
  }

  photo(photoId: () => string | undefined): ApiRead<Photo> {
    return this.client.read(readPhoto, () => {
      const id = photoId();
      return id === undefined ? undefined : { params: { photoId: id } };
    });
  }

  readPhoto(photoId: string): Promise<Photo> {
    return this.client.call(readPhoto, { params: { photoId } });
  }

  reread(photoId: string, facts: RouteBody<typeof rereadPhoto>): Promise<Photo> {
    return this.client.call(rereadPhoto, { params: { photoId }, body: facts });
  }

  imageUrl(photoId: string, view: 'as-taken' | 'rectified'): string {
    return this.client.url(readPhotoImage, { params: { photoId }, query: { view } });
  }

  readJob(jobId: string): Promise<Job> {
    return this.client.call(readJob, { params: { jobId } });
  }

  stopJob(jobId: string): Promise<Job> {
    return this.client.call(stopJob, { params: { jobId } });
  }

  retryJob(jobId: string): Promise<Job> {
    return this.client.call(retryJob, { params: { jobId } });
  }

  scaleSheetUrl(paper: 'A4' | 'Letter', variant: 'light' | 'dark'): string {
    return this.client.url(readScaleSheet, { query: { paper, variant } });
  }
}
