import * as contracts from '@foldwright/shared/contracts/office';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { listMails } from '../services/list-mails';

export function officeMailRoutes({ database }: AppDependencies): BoundRoute[] {
  return [bind(contracts.listMails, async ({ actor }) => ({ mails: await listMails(database, actor) }))];
}
