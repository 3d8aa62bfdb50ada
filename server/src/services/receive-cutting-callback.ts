import type { AppDependencies } from '../app-dependencies';
import type { CuttingProgress } from '../cutting/cutting-service';
import { UnprovenCallback } from '../cutting/cutting-service';
import type { OrderFact } from './order-state';
import { keepingFailures } from './operator/failed-messages';
import { refuseMessage, takeMessage } from './take-message';

/**
 * Take a signed callback of the cutting service, from its bytes as they came.
 * @param header value of a header of the message, by its lower-case name
 * @throws Problem `invalid-input` for one that does not prove where it comes from; nothing of it is stored
 */
export async function receiveCuttingCallback(
  tools: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now' | 'cutting'>,
  body: Buffer,
  header: (name: string) => string | undefined,
): Promise<void> {
  const progress = await provenProgress(tools, body, header);
  if (progress !== null) await handleCuttingProgress(tools, progress, body);
}

/** Act on progress that has proved where it comes from; taken before, it changes nothing. */
export async function handleCuttingProgress(
  tools: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>,
  progress: CuttingProgress,
  body: Buffer,
): Promise<void> {
  const { id, at, step, orderReference } = progress;
  const message = {
    provider: 'cutting',
    eventId: id,
    kind: step,
    aboutId: orderReference,
    happenedAt: at,
    body,
  } as const;
  await keepingFailures(tools.database, { provider: 'cutting', told: progress, body }, tools.now, () =>
    takeMessage(tools, 'find the workshop of a cutting callback', message, {
      order: () => Promise.resolve([factOf(progress)]),
    }),
  );
}

async function provenProgress(
  tools: Pick<AppDependencies, 'database' | 'now' | 'cutting'>,
  body: Buffer,
  header: (name: string) => string | undefined,
): Promise<CuttingProgress | null> {
  try {
    return tools.cutting.readCallback(body, header);
  } catch (error) {
    // Only a missing proof is foreseen here.
    if (error instanceof UnprovenCallback) return refuseMessage(tools, 'cutting', error);
    throw error;
  }
}

function factOf({ id, at, step, trackingCode, reason }: CuttingProgress): OrderFact {
  return {
    key: step,
    kind: step,
    at,
    source: id,
    details: {
      ...(step === 'shipped' && trackingCode !== null ? { trackingCode } : {}),
      ...(step === 'refused' && reason !== null ? { reason } : {}),
    },
  };
}
