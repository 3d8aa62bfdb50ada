import { createHash } from 'node:crypto';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import type { DocumentInput } from '../documents/document-input';
import { makeDxf } from '../documents/dxf';
import { makeFullSizePrint } from '../documents/full-size-print';
import { makeDrawing } from '../documents/part-drawing';
import type { FileStore } from '../files/file-store';
import type { Member } from '../http/visitor';
import type { Draft } from '../models/draft';
import type { Part } from '../models/part';
import type { Computation, PartComputations } from './computed-part';

/** A written file with all that its row needs. */
export interface ReleasedFile {
  readonly kind: 'dxf' | 'drawing' | 'full-size-print';
  readonly stock: StockRole;
  readonly paper: 'none' | 'A4' | 'Letter';
  readonly fileName: string;
  readonly storedAs: string;
  readonly contentType: string;
  readonly byteLength: number;
  readonly sha256: string;
}

export interface ReleaseSubject {
  readonly part: Part;
  readonly draft: Draft;
  readonly document: PartDocument;
  readonly computations: PartComputations;
  readonly hash: string;
}

/** Characters that file systems and mail programs take everywhere. */
const plainName = (text: string): string => text.replace(/[^\p{L}\p{N} ._-]+/gu, '-').trim();

function inputFor(subject: ReleaseSubject, member: Member, computation: Computation, now: Date): DocumentInput {
  const { part, draft, document, hash } = subject;
  const { development, findings, computed } = computation;
  if (development === null) throw new Error('A part without a flat pattern is refused before its files are made.');
  return {
    partName: part.name,
    partNumber: part.number,
    revisionLetter: draft.letter,
    isDraft: false,
    hash,
    releasedAt: now.toISOString(),
    releasedBy: member.userName,
    workshopName: member.workshopName,
    role: computed.role,
    document,
    development,
    findings,
    statement: document.making.statement,
  };
}

/**
 * Make and keep the files of a release: DXF, drawing and full-size print on both papers, for both sheets.
 * On an error the files that were kept already are removed.
 */
export async function writeReleaseDocuments(
  store: FileStore,
  member: Member,
  subject: ReleaseSubject,
  now: Date,
): Promise<ReleasedFile[]> {
  const written: ReleasedFile[] = [];
  const name = plainName(`${subject.part.number} ${subject.draft.letter} ${subject.part.name}`);
  const pdf = 'application/pdf';

  const keep = async (file: Pick<ReleasedFile, 'kind' | 'stock' | 'paper'>, label: string, bytes: Buffer) => {
    const isDxf = file.kind === 'dxf';
    const extension = isDxf ? 'dxf' : 'pdf';
    written.push({
      ...file,
      fileName: `${name} ${label}.${extension}`,
      storedAs: await store.put(member.workshopId, extension, bytes),
      contentType: isDxf ? 'image/vnd.dxf' : pdf,
      byteLength: bytes.length,
      sha256: createHash('sha256').update(bytes).digest('hex'),
    });
  };

  try {
    for (const stock of ['trial', 'production'] as const) {
      const input = inputFor(subject, member, subject.computations[stock], now);
      await keep({ kind: 'dxf', stock, paper: 'none' }, stock, await makeDxf(input));
      await keep({ kind: 'drawing', stock, paper: 'none' }, `${stock} drawing`, await makeDrawing(input));
      for (const paper of ['A4', 'Letter'] as const) {
        const label = `${stock} full size ${paper}`;
        await keep({ kind: 'full-size-print', stock, paper }, label, await makeFullSizePrint(input, { paper }));
      }
    }
    return written;
  } catch (error) {
    await Promise.all(written.map(({ storedAs }) => store.remove(storedAs)));
    throw error;
  }
}
