import { BaseError } from 'sequelize';

/** SQLSTATEs after which PostgreSQL asks for the whole transaction again. Anything else is a mistake and must be seen. */
const CONFLICTS: ReadonlySet<string> = new Set(['40001', '40P01']);
const ATTEMPTS = 5;

/** SQLSTATE of a failed statement, or undefined when the error is not one. */
export function sqlState(error: unknown): string | undefined {
  const source: unknown = error instanceof BaseError && 'parent' in error ? error.parent : error;
  if (typeof source !== 'object' || source === null || !('code' in source)) return undefined;
  return typeof source.code === 'string' ? source.code : undefined;
}

/**
 * Run a whole transaction again when the database chose it as the victim of a conflict.
 * @param transaction must begin and end its own transaction and hold no rows from an earlier try
 */
export async function retryOnConflict<T>(transaction: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await transaction();
    } catch (error) {
      if (attempt === ATTEMPTS || !CONFLICTS.has(sqlState(error) ?? '')) throw error;
      await new Promise((resolve) => setTimeout(resolve, attempt * (5 + Math.random() * 20)));
    }
  }
}
