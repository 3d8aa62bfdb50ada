import type { RuleVerb } from '@foldwright/ui/steel-rule/steel-rule';

/** The verb of a key, among those that the rule offers now; null when the key is none of theirs. */
export function verbOfKey(verbs: readonly RuleVerb[], key: string): string | null {
  return verbs.find((verb) => verb.key?.toLowerCase() === key.toLowerCase())?.id ?? null;
}
