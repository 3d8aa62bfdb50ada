import { Injectable, inject } from '@angular/core';
import { type RevisionDetail, readRevision, readRevisionFile } from '@foldwright/shared/contracts/revisions';
import type { StockRole } from '@foldwright/shared/part/part-document';
import { ApiClient, type ApiRead } from './api-client';

export type RevisionFileKind = 'dxf' | 'drawing' | 'full-size-print' | 'step';

/** Released revisions and their documents. */
@Injectable({ providedIn: 'root' })
export class RevisionsApi {
  private readonly client = inject(ApiClient);

  revision(revisionId: () => string | undefined): ApiRead<RevisionDetail> {
    return this.client.read(readRevision, () => {
      const id = revisionId();
      return id === undefined ? undefined : { params: { revisionId: id } };
    });
  }

  readRevision(revisionId: string): Promise<RevisionDetail> {
    return this.client.call(readRevision, { params: { revisionId } });
  }

  /** Address of one document of a revision; `paper` matters to the full-size print only. */
  fileUrl(revisionId: string, kind: RevisionFileKind, stock: StockRole, paper?: 'A4' | 'Letter'): string {
    const query = paper === undefined ? { stock } : { stock, paper };
    return this.client.url(readRevisionFile, { params: { revisionId, kind }, query });
  }
}
