import * as contracts from '@foldwright/shared/contracts/operator';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { readFailedMessage } from '../services/operator/failed-messages';
import { readTroubles, retryWork, sendMailAgain } from '../services/operator/troubles';
import { handleCuttingProgress } from '../services/receive-cutting-callback';
import { handlePaymentEvent } from '../services/receive-payment-event';

export function operatorRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database } = dependencies;
  return [
    bind(contracts.readTroubles, () => readTroubles(database)),
    bind(contracts.retryWork, ({ actor, params }) => retryWork(dependencies, actor, params.queue, params.workId)),
    bind(contracts.replayMessage, async ({ params }) => {
      const message = await readFailedMessage(database, params.messageId);
      if (message.provider === 'payments') await handlePaymentEvent(dependencies, message.told, message.body);
      else await handleCuttingProgress(dependencies, message.told, message.body);
    }),
    bind(contracts.sendMailAgain, ({ actor, params }) => sendMailAgain(dependencies, actor, params.mailId)),
  ];
}
