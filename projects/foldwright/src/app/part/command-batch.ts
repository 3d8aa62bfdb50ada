import { sendCommands } from '@foldwright/shared/contracts/parts';
import type { CommandBatch } from '../api/drafts-api';
import type { Consignment } from './draft-journal';
import type { PartStep } from './part-steps';

/**
 * A consignment as the contract wants it.
 * @returns null when the contract would refuse it, for instance a length of more than it takes
 */
export function commandBatch(
  consignment: Consignment,
  clientId: string,
  reachedStep: PartStep | null,
): CommandBatch | null {
  const parsed = sendCommands.body.safeParse({
    baseRevision: consignment.baseRevision,
    batchId: consignment.batchId,
    clientId,
    commands: consignment.batches.flatMap((batch) => batch.commands),
    ...(reachedStep === null ? {} : { reachedStep }),
  });
  return parsed.success ? parsed.data : null;
}
