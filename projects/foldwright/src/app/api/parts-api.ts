import { Injectable, inject } from '@angular/core';
import {
  type PartDetail,
  type PartSummary,
  type Starter,
  createPart,
  listParts,
  readPart,
  renamePart,
  startDraft,
  type Draft,
} from '@foldwright/shared/contracts/parts';
import { ApiClient, type ApiRead, newIdempotencyKey } from './api-client';

/** The parts of the workshop. */
@Injectable({ providedIn: 'root' })
export class PartsApi {
  private readonly client = inject(ApiClient);

  list(): ApiRead<{ parts: PartSummary[] }> {
    return this.client.read(listParts, () => ({ query: {} }));
  }

  part(partId: () => string | undefined): ApiRead<PartDetail> {
    return this.client.read(readPart, () => {
      const id = partId();
      return id === undefined ? undefined : { params: { partId: id } };
    });
  }

  readPart(partId: string): Promise<PartDetail> {
    return this.client.call(readPart, { params: { partId } });
  }

  /** Starts a part; `starter` null means from a mock-up. A repeated call with the same key makes one part. */
  create(
    part: { readonly name: string; readonly number?: string; readonly starter: Starter | null },
    idempotencyKey = newIdempotencyKey(),
  ): Promise<PartDetail> {
    return this.client.call(createPart, { body: part, idempotencyKey });
  }

  rename(partId: string, revision: number, name: string, number: string): Promise<PartDetail> {
    return this.client.call(renamePart, { params: { partId }, body: { name, number }, ifMatch: revision });
  }

  startDraft(partId: string): Promise<Draft> {
    return this.client.call(startDraft, { params: { partId } });
  }
}
