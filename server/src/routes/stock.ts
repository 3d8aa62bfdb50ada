import * as kits from '@foldwright/shared/contracts/kits';
import * as contracts from '@foldwright/shared/contracts/stock';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { listReleasedBrackets } from '../services/stock/brackets';
import { adjustStock, receiveStock } from '../services/stock/change-stock';
import { listEarnings, setPartHardware } from '../services/stock/earnings';
import { changeHardware, createHardware } from '../services/stock/hardware';
import { changeKit, createKit, listKits } from '../services/stock/kits';
import { makeOtherHand, setPartHand } from '../services/stock/part-hand';
import { listStock, listStockMoves } from '../services/stock/read-stock';

export function stockRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, now } = dependencies;
  return [
    bind(contracts.listStock, ({ actor }) => listStock(database, actor)),
    bind(contracts.receiveStock, ({ actor, body, idempotencyKey }) =>
      receiveStock(dependencies, actor, body, idempotencyKey),
    ),
    bind(contracts.adjustStock, ({ actor, params, body, idempotencyKey }) =>
      adjustStock(dependencies, actor, { ...body, positionId: params.positionId }, idempotencyKey),
    ),
    bind(contracts.listStockMoves, async ({ actor, params }) => ({
      moves: await listStockMoves(database, actor, params.positionId),
    })),
    bind(contracts.createHardware, ({ actor, body, idempotencyKey }) =>
      createHardware(database, actor, body, idempotencyKey),
    ),
    bind(contracts.changeHardware, ({ actor, params, body, ifMatch }) =>
      changeHardware(database, actor, params.hardwareId, body, ifMatch),
    ),
    bind(kits.listKits, ({ actor }) => listKits(database, actor)),
    bind(kits.createKit, ({ actor, body, idempotencyKey }) => createKit(database, actor, body, idempotencyKey, now())),
    bind(kits.changeKit, ({ actor, params, body, ifMatch }) => changeKit(database, actor, params.kitId, body, ifMatch)),
    bind(contracts.listReleasedBrackets, async ({ actor }) => ({
      brackets: await listReleasedBrackets(database, actor),
    })),
    bind(kits.listEarnings, async ({ actor }) => ({ earnings: await listEarnings(database, actor) })),
    bind(kits.setPartHardware, async ({ actor, params, body }) => ({
      hardware: await setPartHardware(database, actor, params.partId, body.hardware),
    })),
    bind(contracts.setPartHand, ({ actor, params, body }) => setPartHand(database, actor, params.partId, body.hand)),
    bind(contracts.makeOtherHand, ({ actor, params, body, idempotencyKey }) =>
      makeOtherHand(database, actor, params.partId, body.name, idempotencyKey, now()),
    ),
  ];
}
