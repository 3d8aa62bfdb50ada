import fc from 'fast-check';

const USUAL_RUNS = 1000;

/**
 * How often a property of the kernel is tried: a thousand times, or as often as FOLDWRIGHT_RUNS says (100000 for a night's run), which
 * the set-up of the tests hands to fast-check.
 * @param share of that, for a property that is dear for what it finds
 */
export function runs(share = 1): number {
  return Math.max(1, Math.round((fc.readConfigureGlobal()?.numRuns ?? USUAL_RUNS) * share));
}
