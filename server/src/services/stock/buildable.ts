import type { Kit, KitLine } from '@foldwright/shared/contracts/kits';

/** What the counting needs of a position. */
export interface Counted {
  readonly revisionId: string | null;
  readonly finishId: string | null;
  readonly hardwareId: string | null;
  readonly onHand: number;
  readonly reserved: number;
}

const BARE = 'bare';

interface Need {
  readonly what: string;
  readonly quantity: number;
  readonly free: number;
}

/** Lines that need the same thing count together. */
function needsOf(lines: readonly KitLine[], positions: readonly Counted[], chosenFinishId: string): readonly Need[] {
  const needs = new Map<string, Need>();
  const need = (key: string, what: string, quantity: number, isOf: (position: Counted) => boolean): void => {
    const free = positions.filter(isOf).reduce((sum, { onHand, reserved }) => sum + onHand - reserved, 0);
    needs.set(key, { what, quantity: (needs.get(key)?.quantity ?? 0) + quantity, free });
  };
  for (const line of lines) {
    if (line.kind === 'hardware') {
      const { id, name } = line.hardware;
      need(id, name, line.quantity, ({ hardwareId }) => hardwareId === id);
    } else {
      const { revisionId, partName, letter } = line.bracket;
      const finishId = line.finishId ?? chosenFinishId;
      need(`${revisionId} ${finishId}`, `${partName}, revision ${letter}`, line.quantity, (position) => {
        return position.revisionId === revisionId && position.finishId === finishId;
      });
    }
  }
  return [...needs.values()];
}

/**
 * For each finish that somebody could choose: how many kits what is free on the shelf makes, and what one kit more would
 * lack. Finishes are those in which a bracket with free choice ever lay on the shelf; bare when there is no choice.
 */
export function countBuildable(lines: readonly KitLine[], positions: readonly Counted[]): Kit['buildable'] {
  const open = lines.flatMap((line) =>
    line.kind === 'bracket' && line.finishId === null ? [line.bracket.revisionId] : [],
  );
  const seen = positions.flatMap(({ revisionId, finishId }) =>
    revisionId !== null && finishId !== null && open.includes(revisionId) ? [finishId] : [],
  );
  const finishes = [...new Set(seen.length > 0 ? seen : [BARE])].sort();
  return finishes.map((finishId) => {
    const needs = needsOf(lines, positions, finishId);
    const kits = Math.min(...needs.map(({ free, quantity }) => Math.floor(free / quantity)));
    const shortest = needs
      .map(({ what, free, quantity }) => ({ what, missing: quantity * (kits + 1) - free }))
      .filter(({ missing }) => missing > 0);
    return { finishId, kits, shortest };
  });
}
