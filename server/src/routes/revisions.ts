import * as contracts from '@foldwright/shared/contracts/revisions';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { readRevision, readRevisionFile } from '../services/read-revision';

export function revisionRoutes({ database, files }: AppDependencies): BoundRoute[] {
  return [
    bind(contracts.readRevision, ({ actor, params }) => readRevision(database, actor, params.revisionId)),
    bind(contracts.readRevisionFile, ({ actor, params, query }) =>
      readRevisionFile(database, files, actor, params.revisionId, { kind: params.kind, ...query }),
    ),
  ];
}
