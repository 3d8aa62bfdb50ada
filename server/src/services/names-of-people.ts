import { Op } from 'sequelize';
import type { WorkshopScope } from '../database/workshop-scope';

/** Looks up the name of a person who did something. */
export type NameOf = (userId: string) => string;

/** Names for these ids, read at once. An account that is gone has none. */
export async function namesOfPeople(scope: WorkshopScope, userIds: Iterable<string>): Promise<NameOf> {
  const ids = [...new Set(userIds)];
  const users =
    ids.length === 0
      ? []
      : await scope.models.users.findAll({
          attributes: ['id', 'name'],
          where: { id: { [Op.in]: ids } },
          transaction: scope.transaction,
        });
  const names = new Map(users.map(({ id, name }) => [id, name]));
  return (userId) => names.get(userId) ?? 'somebody who left';
}
