import { listAuditTrail, listMembers, readInstallation } from '@foldwright/shared/contracts/office';
import * as contracts from '@foldwright/shared/contracts/system';
import type { AppDependencies } from '../app-dependencies';
import { streamEvents } from '../events/stream-events';
import { describeApi } from '../http/open-api';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { isSessionAlive } from '../http/session';
import { loadVisitor } from '../services/load-visitor';
import * as members from '../services/read-members';
import { readHealth } from '../services/read-health';
import * as installation from '../services/read-installation';

export function systemRoutes({ database, files, hub, logger }: AppDependencies): BoundRoute[] {
  const description = describeApi();
  return [
    bind(contracts.readHealth, async ({ response }) => {
      const health = await readHealth(database, files);
      if (!health.ok) response.status(503);
      return health;
    }),
    bind(contracts.readOpenApi, async () => description),
    bind(contracts.streamEvents, async ({ actor, request, response }) => {
      const { current, user } = actor;
      await streamEvents(request, response, {
        database,
        hub,
        listener: current,
        stillAdmitted: async () => {
          if (!(await isSessionAlive(request))) return false;
          const now = (await loadVisitor(database, user.id, current?.workshopId)).current;
          return now?.workshopId === current?.workshopId && now?.role === current?.role;
        },
        onError: (error) => logger.warn({ err: error }, 'live stream'),
      });
    }),
    bind(listMembers, async ({ actor }) => ({ members: await members.listMembers(database, actor) })),
    bind(listAuditTrail, async ({ actor }) => ({ entries: await members.listAuditTrail(database, actor) })),
    bind(readInstallation, () => installation.readInstallation(database)),
  ];
}
