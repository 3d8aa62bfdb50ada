import type { HardwareInput, HardwareItem as HardwareContract } from '@foldwright/shared/contracts/stock';
import { createHardware as createContract, hardwareItemSchema } from '@foldwright/shared/contracts/stock';
import { UniqueConstraintError } from 'sequelize';
import type { Database } from '../../database/database';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import { presentHardware } from '../../presenters/stock';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { refuseStale } from '../refuse-stale';

const valuesOf = ({ name, specification, cost, isInUse }: HardwareInput) => ({
  name,
  specification,
  costMinor: cost.amountMinor,
  currency: cost.currency,
  isInUse,
});

async function refuseTwin<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Problem('already-exists', {
      detail: 'There is hardware of this name and specification already.',
      kept: 'Nothing was changed.',
      errors: [{ pointer: '/specification', detail: 'Choose another specification.' }],
    });
  }
}

/** Add a hardware item, once under the caller's key. @throws Problem `already-exists` */
export function createHardware(
  database: Database,
  actor: Member,
  input: HardwareInput,
  key: string,
): Promise<HardwareContract> {
  const { workshopId, userId } = actor;
  return refuseTwin(() =>
    database.inWorkshop(workshopId, (scope) =>
      once(scope, { userId, route: createContract.id, key, request: input }, hardwareItemSchema, async () => {
        const item = await scope.rows.hardwareItems.add(valuesOf(input));
        await recordAudit(scope, actor, 'Added hardware', item.name);
        return presentHardware(item);
      }),
    ),
  );
}

/** @throws Problem `not-found`, `stale-row`, `already-exists` */
export function changeHardware(
  database: Database,
  actor: Member,
  hardwareId: string,
  input: HardwareInput,
  seenRevision: number,
): Promise<HardwareContract> {
  return refuseTwin(() =>
    database.inWorkshop(actor.workshopId, async (scope) => {
      const item = await scope.rows.hardwareItems.get(hardwareId, { lock: true });
      refuseStale(item, seenRevision);
      await scope.rows.hardwareItems.change(item, { ...valuesOf(input), revision: item.revision + 1 });
      await recordAudit(scope, actor, 'Changed hardware', item.name);
      return presentHardware(item);
    }),
  );
}
