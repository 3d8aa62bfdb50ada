/** Source of the motion tokens: a fold settles in 320 ms. */
export const FOLD_MS = 320;

/** Fraction on the way from one fold to another after so many ms: quick first, gentle at the end. */
export function foldAt(from: number, to: number, elapsedMs: number): number {
  const t = Math.min(1, Math.max(0, elapsedMs / FOLD_MS));
  return from + (to - from) * (1 - (1 - t) ** 3);
}

/** Where a fold that was let go near an end comes to rest: at that end. */
export function restingFold(fold: number): number {
  if (fold < 0.05) return 0;
  return fold > 0.95 ? 1 : fold;
}
