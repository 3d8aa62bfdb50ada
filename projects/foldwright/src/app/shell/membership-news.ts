import type { Session } from '@foldwright/shared/contracts/session';

type Belonging = Session['memberships'][number];

/** What to tell somebody whose workshop or role is another one than before; null when nothing was done to them. */
export function membershipNews(
  before: Belonging | null,
  now: Belonging | null,
  memberships: readonly Belonging[],
): { readonly title: string; readonly detail: string } | null {
  if (before === null) return null;
  const same = memberships.find(({ workshopId }) => workshopId === before.workshopId);
  if (same === undefined) {
    return {
      title: `You no longer belong to ${before.workshopName}`,
      detail: now === null ? 'An owner can invite you again.' : `You work in ${now.workshopName} now.`,
    };
  }
  if (same.role === before.role) return null;
  return { title: `You are ${same.role} in ${same.workshopName} now`, detail: 'An owner changed what you may do.' };
}
