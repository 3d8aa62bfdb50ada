import { describeCommand } from '@foldwright/shared/part/describe-command';
import type { CommandLogEntry } from '../api/drafts-api';
import type { SetAside } from './draft-journal';

/**
 * One line about what somebody else changed, oldest of two changes first.
 * @param since what the server took since the revision this tab knew, in any order
 * @returns null when all of it came from this tab
 */
export function changeWords(since: readonly CommandLogEntry[], ownClientId: string): string | null {
  const others = since.filter((entry) => entry.clientId !== ownClientId).sort((a, b) => a.revision - b.revision);
  const last = others.at(-1);
  if (last === undefined) return null;
  const labels = [...new Set(others.flatMap((entry) => entry.commands.map(describeCommand)))];
  const more = labels.length > 2 ? ` and ${labels.length - 2} more` : '';
  return `${last.by} changed this draft: ${labels.slice(0, 2).join(', ')}${more}`;
}

/** One line about own edits that no longer fit, after the line about what came in between; null when all fit. */
export function setAsideWords(setAside: readonly SetAside[], changed: string | null): string | null {
  const first = setAside[0];
  if (first === undefined) return null;
  const others = setAside.length === 1 ? '' : ` and ${setAside.length - 1} more`;
  const lead = changed === null ? '' : `${changed}. `;
  return `${lead}Your “${first.batch.label}”${others} no longer fits: ${first.reason}`;
}
