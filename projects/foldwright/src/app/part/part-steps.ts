import { PART_STEPS } from '@foldwright/shared/contracts/parts';

/** A step of the road from mock-up to release, as it stands in the address. */
export type PartStep = (typeof PART_STEPS)[number];

/** The steps as the route strip and the one call to act say them. */
export const STEP_WORDS: Readonly<Record<PartStep, string>> = {
  'mock-up': 'Mock-up',
  outline: 'Outline',
  bends: 'Bends',
  checks: 'Checks',
  'full-size-print': 'Full-size print',
  release: 'Release',
};

/** The step that follows, or null after the last. */
export function stepAfter(step: PartStep): PartStep | null {
  return PART_STEPS[PART_STEPS.indexOf(step) + 1] ?? null;
}

/** Whether the draft has been as far as a step. */
export function hasReached(furthest: PartStep, step: PartStep): boolean {
  return PART_STEPS.indexOf(step) <= PART_STEPS.indexOf(furthest);
}

/** Whether a text of an address names a step. */
export function isPartStep(text: string): text is PartStep {
  return PART_STEPS.some((step) => step === text);
}
