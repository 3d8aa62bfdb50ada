import type { Database } from '../database/database';
import { isPasswordRight, spendPasswordTime } from './password-hash';

/** Id of the account that e-mail and password belong to; null when there is none, after the same time. */
export async function checkPassword(database: Database, email: string, password: string): Promise<string | null> {
  const user = await database.models.users.findOne({ where: { email: email.trim().toLowerCase() } });
  if (user === null) {
    await spendPasswordTime(password);
    return null;
  }
  return (await isPasswordRight(password, user.passwordHash)) ? user.id : null;
}
