import { createHash } from 'node:crypto';
import type { StockRole } from '@foldwright/shared/part/part-document';
import type { FileStore } from '../files/file-store';

export type ReleasedFileKind = 'dxf' | 'drawing' | 'full-size-print' | 'step';

/** A written file with all that its row needs. */
export interface ReleasedFile {
  readonly kind: ReleasedFileKind;
  readonly stock: StockRole;
  readonly paper: 'none' | 'A4' | 'Letter';
  readonly fileName: string;
  readonly storedAs: string;
  readonly contentType: string;
  readonly byteLength: number;
  readonly sha256: string;
}

const FORMATS: Readonly<Record<ReleasedFileKind, { readonly extension: string; readonly contentType: string }>> = {
  dxf: { extension: 'dxf', contentType: 'image/vnd.dxf' },
  drawing: { extension: 'pdf', contentType: 'application/pdf' },
  'full-size-print': { extension: 'pdf', contentType: 'application/pdf' },
  step: { extension: 'step', contentType: 'model/step' },
};

/** Characters that file systems and mail programs take everywhere. */
const plainName = (text: string): string => text.replace(/[^\p{L}\p{N} ._-]+/gu, '-').trim();

/** What the files of a release are called, without what tells them apart. */
export function releaseName(part: { readonly number: string; readonly name: string }, letter: string): string {
  return plainName(`${part.number} ${letter} ${part.name}`);
}

/** Put a file of a release into the store. @param title its name without the extension */
export async function keepReleasedFile(
  store: FileStore,
  workshopId: string,
  file: Pick<ReleasedFile, 'kind' | 'stock' | 'paper'>,
  title: string,
  bytes: Buffer,
): Promise<ReleasedFile> {
  const { extension, contentType } = FORMATS[file.kind];
  return {
    ...file,
    fileName: `${title}.${extension}`,
    storedAs: await store.put(workshopId, extension, bytes),
    contentType,
    byteLength: bytes.length,
    sha256: createHash('sha256').update(bytes).digest('hex'),
  };
}
