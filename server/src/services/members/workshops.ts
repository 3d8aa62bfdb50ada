import { randomUUID } from 'node:crypto';
import { UniqueConstraintError } from 'sequelize';
import type { Database } from '../../database/database';
import { Problem } from '../../http/problem';
import { hashPassword } from '../password-hash';
import { recordAudit } from '../record-audit';

export interface NewWorkshop {
  readonly workshopName: string;
  readonly numberPrefix: string;
}

export interface NewAccount {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/**
 * Make a workshop with its owner. The transaction works in the new workshop from its first statement on, so that the walls
 * of the database let it write there and nowhere else.
 * @returns id of the workshop
 */
export async function addOwnedWorkshop(
  database: Database,
  owner: { readonly userId: string; readonly userName: string },
  { workshopName, numberPrefix }: NewWorkshop,
): Promise<string> {
  const workshopId = randomUUID();
  await database.inWorkshop(workshopId, async (scope) => {
    await scope.addWorkshop({ name: workshopName, numberPrefix });
    await scope.rows.memberships.add({ userId: owner.userId, role: 'owner' });
    await recordAudit(scope, owner, 'Started the workshop', workshopName);
  });
  return workshopId;
}

/**
 * Make an account. That an address has one already is told: whoever types it here could find out by asking for an
 * invitation just as well, and its owner has to know what to do.
 * @returns id of the account
 * @throws Problem `already-exists`
 */
export async function addAccount(database: Database, { name, email, password }: NewAccount): Promise<string> {
  const passwordHash = await hashPassword(password);
  try {
    const user = await database.models.users.create({ name, email: email.trim().toLowerCase(), passwordHash });
    return user.id;
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Problem('already-exists', {
      detail: 'This address has an account.',
      kept: 'Nothing was made.',
      next: 'Sign in with it; another workshop can be started under “Your account”.',
      errors: [{ pointer: '/email', detail: 'This address has an account. Sign in instead.' }],
    });
  }
}
