import type { PartCommand } from '../part/commands';
import type { Mend } from './finding';
import type { RuleContext } from './rule-context';

/** A mend, if it holds when it is tried. */
export function tried(context: RuleContext, findingId: string, mend: Mend | null): Mend | null {
  return mend === null ? null : mendThatHolds(context, findingId, mend.label, mend.commands);
}

/**
 * A mend that has been tried: applied, it takes its finding away and brings nothing that cannot be made.
 * @param findingId id of the finding it is for
 * @returns null when it does not hold, or while another mend is being tried
 */
export function mendThatHolds(
  context: RuleContext,
  findingId: string,
  label: string,
  commands: readonly PartCommand[],
): Mend | null {
  if (commands.length === 0 || context.tryOut === null) return null;
  const outcome = context.tryOut(commands);
  if (outcome === null || outcome.addsBlocker || outcome.findingIds.has(findingId)) return null;
  return { label, commands };
}
