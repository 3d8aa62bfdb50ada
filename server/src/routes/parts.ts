import * as contracts from '@foldwright/shared/contracts/parts';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { ComputationCache } from '../services/computation-cache';
import { computeDraft } from '../services/compute-draft';
import { createPart } from '../services/create-part';
import { listParts } from '../services/list-parts';
import { printDraft } from '../services/print-draft';
import { readDraft, readDraftHistory } from '../services/read-draft';
import { readPart } from '../services/read-part';
import { releaseDraft } from '../services/release-draft';
import { renamePart } from '../services/rename-part';
import { sendCommands } from '../services/send-commands';
import { startDraft } from '../services/start-draft';

export function partRoutes({ database, files, queue, now }: AppDependencies): BoundRoute[] {
  const cache = new ComputationCache();
  return [
    bind(contracts.listParts, async ({ actor, query }) => ({ parts: await listParts(database, actor, query.search) })),
    bind(contracts.createPart, ({ actor, body, idempotencyKey }) =>
      createPart(database, actor, body, idempotencyKey, now()),
    ),
    bind(contracts.readPart, ({ actor, params }) => readPart(database, actor, params.partId)),
    bind(contracts.renamePart, ({ actor, params, body, ifMatch }) =>
      renamePart(database, actor, params.partId, body, ifMatch, now()),
    ),
    bind(contracts.startDraft, ({ actor, params }) => startDraft(database, actor, params.partId, now())),
    bind(contracts.readDraft, ({ actor, params }) => readDraft(database, actor, params.draftId)),
    bind(contracts.sendCommands, ({ actor, params, body }) =>
      sendCommands(database, cache, actor, params.draftId, body, now()),
    ),
    bind(contracts.readDraftHistory, async ({ actor, params, query }) => ({
      entries: await readDraftHistory(database, actor, params.draftId, query.sinceRevision ?? 0),
    })),
    bind(contracts.computeDraft, ({ actor, params, query }) =>
      computeDraft(database, cache, actor, params.draftId, query.stock),
    ),
    bind(contracts.printDraft, ({ actor, params, query }) =>
      printDraft(database, cache, actor, params.draftId, { role: query.stock, paper: query.paper }),
    ),
    bind(contracts.releaseDraft, ({ actor, params, body, idempotencyKey }) =>
      releaseDraft(database, files, actor, params.draftId, body, idempotencyKey, now(), async (scope, revisionId) => {
        await queue.enqueue(scope.transaction, 'solid', { workshopId: scope.workshopId, revisionId });
      }),
    ),
  ];
}
