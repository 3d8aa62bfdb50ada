import { createHash, randomUUID } from 'node:crypto';
import { UniqueConstraintError } from 'sequelize';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
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

interface Owner {
  readonly userId: string;
  readonly userName: string;
}

/**
 * Make a workshop and its owner's membership. The transaction works in the new workshop from its first statement on, so
 * that the walls of the database let it write there and nowhere else.
 */
async function makeWorkshop(
  database: Database,
  workshopId: string,
  makeOwner: (scope: WorkshopScope) => Promise<Owner>,
  { workshopName, numberPrefix }: NewWorkshop,
): Promise<Owner> {
  return database.inWorkshop(workshopId, async (scope) => {
    const owner = await makeOwner(scope);
    await scope.addWorkshop({ name: workshopName, numberPrefix });
    await scope.rows.memberships.add({ userId: owner.userId, role: 'owner' });
    await recordAudit(scope, owner, 'Started the workshop', workshopName);
    return owner;
  });
}

/** An id that follows from who makes a workshop under which key: a second press finds the first one's workshop. */
function workshopIdFor(userId: string, key: string): string {
  const hex = createHash('sha256').update(`${userId} ${key}`).digest('hex');
  // Version 8 is for ids that somebody derives in their own way. Source: RFC 9562, 5.8.
  return [hex.slice(0, 8), hex.slice(8, 12), `8${hex.slice(13, 16)}`, `8${hex.slice(17, 20)}`, hex.slice(20, 32)].join(
    '-',
  );
}

/**
 * Make a workshop for somebody who has an account, once under their key.
 * @returns id of the workshop
 * @throws Problem `already-exists` when the key was used for another workshop
 */
export async function addOwnedWorkshop(
  database: Database,
  owner: Owner,
  workshop: NewWorkshop,
  key: string,
): Promise<string> {
  const workshopId = workshopIdFor(owner.userId, key);
  try {
    await makeWorkshop(database, workshopId, async () => owner, workshop);
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    const made = await database.inWorkshop(workshopId, (scope) => scope.workshop());
    if (made.name !== workshop.workshopName) {
      throw new Problem('already-exists', {
        detail: `With this key you started ${made.name}.`,
        kept: 'Nothing was made.',
      });
    }
  }
  return workshopId;
}

/**
 * Make an account together with the workshop that it owns: both or neither, so that a try that broke can be made again.
 * @throws Problem `already-exists`
 */
export async function signUp(
  database: Database,
  { name, email, password, ...workshop }: NewAccount & NewWorkshop,
): Promise<{ readonly userId: string; readonly workshopId: string }> {
  const passwordHash = await hashPassword(password);
  const makeOwner = async (scope: WorkshopScope): Promise<Owner> => ({
    userId: await addAccount(scope, { name, email, passwordHash }),
    userName: name,
  });
  const workshopId = randomUUID();
  const { userId } = await makeWorkshop(database, workshopId, makeOwner, workshop);
  return { userId, workshopId };
}

/**
 * Make an account. That an address has one already is told, although a stranger may be asking: whoever owns it has to know
 * what to do, since this page writes no mail. Asking for many addresses in a row is held up by the limit on signing up.
 * @returns id of the account
 * @throws Problem `already-exists`
 */
export async function addAccount(
  scope: WorkshopScope,
  { name, email, passwordHash }: { readonly name: string; readonly email: string; readonly passwordHash: string },
): Promise<string> {
  try {
    const values = { name, email: email.toLowerCase(), passwordHash };
    return (await scope.models.users.create(values, { transaction: scope.transaction })).id;
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
