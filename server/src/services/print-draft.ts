import type { StockRole } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import { makeFullSizePrint } from '../documents/full-size-print';
import type { FileAnswer } from '../http/file-answer';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { ComputationCache } from './computation-cache';
import type { Computation } from './computed-part';
import { readStoredDocument } from './stored-document';

/** What stands in the way of a flat pattern, for a problem. */
export function cannotBeDeveloped({ findings }: Computation): Problem {
  const blockers = findings.filter(({ severity }) => severity === 'blocker');
  return new Problem('cannot-be-developed', {
    detail: blockers[0]?.title ?? 'The part has no flat pattern as it is drawn.',
    kept: 'The draft is as it was.',
    next: blockers[0]?.advice ?? 'Look at the checks.',
    extra: { findings: blockers },
  });
}

/**
 * Full-size print of the draft's flat pattern.
 * @throws Problem `not-found`, `cannot-be-developed`
 */
export async function printDraft(
  database: Database,
  cache: ComputationCache,
  member: Member,
  draftId: string,
  options: { role: StockRole; paper: 'A4' | 'Letter' },
): Promise<FileAnswer> {
  const { draft, part } = await database.inWorkshop(member.workshopId, async (scope) => {
    const row = await scope.rows.drafts.get(draftId);
    return { draft: row, part: await scope.rows.parts.get(row.partId) };
  });
  const document = readStoredDocument(draft.document);
  const computation = cache.get(draft.id, draft.revision, options.role, () => document);
  const { development, findings } = computation;
  if (development === null) throw cannotBeDeveloped(computation);
  const bytes = await makeFullSizePrint(
    {
      partName: part.name,
      partNumber: part.number,
      revisionLetter: draft.letter,
      isDraft: true,
      hash: null,
      releasedAt: null,
      releasedBy: null,
      workshopName: member.workshopName,
      role: options.role,
      document,
      development,
      findings,
      statement: document.making.statement,
    },
    { paper: options.paper },
  );
  return {
    bytes,
    contentType: 'application/pdf',
    fileName: `${part.number} draft ${draft.letter} full size ${options.paper}.pdf`,
    disposition: 'inline',
    isImmutable: false,
  };
}
