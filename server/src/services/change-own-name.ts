import type { Database } from '../database/database';

/** Change the name that others see beside a person's work. */
export async function changeOwnName(database: Database, userId: string, name: string): Promise<void> {
  await database.forUser(userId, async (transaction) => {
    await database.models.users.update({ name }, { where: { id: userId }, transaction });
  });
}
