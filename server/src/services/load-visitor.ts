import { ROLES } from '@foldwright/shared/contracts/route';
import { QueryTypes } from 'sequelize';
import * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { Visitor } from '../http/visitor';
import { NOBODY } from '../http/visitor';

const rowsSchema = z.array(
  z.object({
    id: z.string(),
    name: z.string(),
    email: z.string(),
    is_operator: z.boolean(),
    workshop_id: z.nullable(z.string()),
    workshop_name: z.nullable(z.string()),
    role: z.nullable(z.enum(ROLES)),
  }),
);

const STATEMENT = `
  SELECT u.id, u.name, u.email, u.is_operator, w.id AS workshop_id, w.name AS workshop_name, m.role
  FROM users u LEFT JOIN memberships m ON m.user_id = u.id LEFT JOIN workshops w ON w.id = m.workshop_id
  WHERE u.id = $1 ORDER BY w.name, w.id`;

/**
 * A person with their workshops as they are now.
 * @param workshopId the workshop the session works in. They are in none when it isn't theirs any more: what they were
 *   about to do there must not happen in another one. The first one counts when the session names none.
 */
export async function loadVisitor(
  database: Database,
  userId: string,
  workshopId: string | undefined,
): Promise<Visitor> {
  const rows = await database.forUser(userId, async (transaction) =>
    rowsSchema.parse(
      await database.models.sequelize.query(STATEMENT, { bind: [userId], transaction, type: QueryTypes.SELECT }),
    ),
  );
  const first = rows[0];
  if (first === undefined) return NOBODY;
  const memberships = rows.flatMap(({ workshop_id, workshop_name, role }) =>
    workshop_id === null || workshop_name === null || role === null
      ? []
      : [{ workshopId: workshop_id, workshopName: workshop_name, role }],
  );
  return {
    user: { id: first.id, name: first.name, email: first.email, isOperator: first.is_operator },
    memberships,
    current:
      (workshopId === undefined ? memberships[0] : memberships.find((one) => one.workshopId === workshopId)) ?? null,
  };
}
