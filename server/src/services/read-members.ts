import type { auditEntrySchema, memberSchema } from '@foldwright/shared/contracts/office';
import { Op } from 'sequelize';
import type * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { CREW } from './members/crew';

const LONGEST_TRAIL = 500;

/** The crew of the workshop by name, with what they may do. Customers are no members in this sense: the shop knows them. */
export function listMembers(database: Database, member: Member): Promise<z.output<typeof memberSchema>[]> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const memberships = await scope.rows.memberships.list({ where: { role: [...CREW] } });
    const users = await scope.models.users.findAll({
      attributes: ['id', 'name', 'email'],
      where: { id: { [Op.in]: memberships.map(({ userId }) => userId) } },
      transaction: scope.transaction,
    });
    const byId = new Map(users.map((user) => [user.id, user]));
    return memberships
      .flatMap(({ userId, role, revision }) => {
        const user = byId.get(userId);
        return user === undefined ? [] : [{ userId, name: user.name, email: user.email, role, revision }];
      })
      .sort((a, b) => a.name.localeCompare(b.name, 'en') || a.userId.localeCompare(b.userId));
  });
}

/** The latest entries of the audit trail, newest first. */
export function listAuditTrail(database: Database, member: Member): Promise<z.output<typeof auditEntrySchema>[]> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const entries = await scope.rows.auditEntries.list({
      order: [
        ['createdAt', 'DESC'],
        ['id', 'ASC'],
      ],
      limit: LONGEST_TRAIL,
    });
    return entries.map(({ id, createdAt, byName, what, about }) => ({
      id,
      at: createdAt.toISOString(),
      by: byName,
      what,
      about,
    }));
  });
}
