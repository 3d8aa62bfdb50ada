import type { Database } from '../database/database';

/** Count a message that did not prove where it came from. Nothing of it is kept: anybody could fill the table. */
export async function countRefusedMessage(
  database: Database,
  provider: 'payments' | 'cutting',
  now: Date,
): Promise<void> {
  await database.pool.query(
    `INSERT INTO webhook_refusals (provider, refused, last_at) VALUES ($1, 1, $2)
     ON CONFLICT (provider) DO UPDATE SET refused = webhook_refusals.refused + 1, last_at = EXCLUDED.last_at`,
    [provider, now],
  );
}
