import type { CrewRole } from '@foldwright/shared/contracts/members';

/** What each role may do, in a few words. */
export const ROLE_WORDS: Readonly<Record<CrewRole, string>> = {
  owner: 'everything, money and members too',
  fabricator: 'parts, stock and parcels',
  viewer: 'looks and comments, changes nothing',
};
