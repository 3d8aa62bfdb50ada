import { Problem } from '../http/problem';

/** @throws Problem `stale-row` when somebody else changed a row since it was seen */
export function refuseStale(row: { readonly revision: number }, seenRevision: number): void {
  if (row.revision === seenRevision) return;
  throw new Problem('stale-row', {
    detail: 'Somebody else changed this since you opened it.',
    kept: 'Their change is kept, and what you typed is still in the page.',
    next: 'Load it again and look at both.',
    extra: { revision: row.revision },
  });
}
