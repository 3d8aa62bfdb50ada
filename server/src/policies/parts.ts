import type { Role } from '@foldwright/shared/contracts/route';

/** Whether somebody with this role changes parts, drafts and photos; the others look. */
export const canEditParts = (role: Role): boolean => role === 'owner' || role === 'fabricator';
