import { UniqueConstraintError } from 'sequelize';
import { Problem } from '../http/problem';

const isTakenNumber = (error: unknown): boolean =>
  error instanceof UniqueConstraintError &&
  'constraint' in error.parent &&
  error.parent.constraint === 'parts_number_once';

/**
 * Run work that gives a part its number.
 * @throws Problem `already-exists` pointing at the number when another part of the workshop has it
 */
export async function refuseTakenNumber<T>(number: string | undefined, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!isTakenNumber(error)) throw error;
    throw new Problem('already-exists', {
      detail: `Another part has the number ${number ?? 'that came next'}.`,
      kept: 'Nothing was changed.',
      errors: [{ pointer: '/number', detail: 'Choose another number.' }],
    });
  }
}
