import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { DocumentInput } from '../documents/document-input';
import { makeDxf } from '../documents/dxf';
import { makeFullSizePrint } from '../documents/full-size-print';
import { makeDrawing } from '../documents/part-drawing';
import type { FileStore } from '../files/file-store';
import type { Member } from '../http/visitor';
import type { Draft } from '../models/draft';
import type { Part } from '../models/part';
import type { Computation, PartComputations } from './computed-part';
import type { ReleasedFile } from './released-file';
import { keepReleasedFile, releaseName } from './released-file';

export interface ReleaseSubject {
  readonly part: Part;
  readonly draft: Draft;
  readonly document: PartDocument;
  readonly computations: PartComputations;
  readonly hash: string;
}

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
  const name = releaseName(subject.part, subject.draft.letter);
  const keep = async (file: Pick<ReleasedFile, 'kind' | 'stock' | 'paper'>, label: string, bytes: Buffer) => {
    written.push(await keepReleasedFile(store, member.workshopId, file, `${name} ${label}`, bytes));
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
