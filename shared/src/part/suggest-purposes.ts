import type { HolePurpose } from '../bending/layout';
import { METRIC_FASTENERS } from '../stock/fastener-tables';

/** A purpose that a measured hole may have been meant for, with how far its diameter is off. */
export interface PurposeSuggestion {
  readonly purpose: HolePurpose;
  readonly differenceMm: number;
}

const KIND_RANK = { clearance: 0, tapped: 1, 'rivet-nut': 2 } as const;

/**
 * Fasteners whose holes are as large as a measured one, nearest first; at equal distance clearance (medium, close,
 * coarse) before tapped before rivet nut.
 * @param diameterMm measured diameter
 * @param withinMm how far the measurement may be off
 */
export function suggestPurposes(diameterMm: number, withinMm: number): readonly PurposeSuggestion[] {
  const candidates = METRIC_FASTENERS.flatMap((row): readonly (PurposeSuggestion & { readonly rank: number })[] => {
    const { thread } = row;
    const offered: readonly (readonly [HolePurpose, number, number])[] = [
      ...(['medium', 'close', 'coarse'] as const).map(
        (fit, order) =>
          [{ kind: 'clearance', thread, fit }, row.clearanceMm[fit], KIND_RANK.clearance + order / 10] as const,
      ),
      [{ kind: 'tapped', thread }, row.tapDrillMm, KIND_RANK.tapped],
      ...(row.rivetNutMm === null
        ? []
        : [[{ kind: 'rivet-nut', thread }, row.rivetNutMm, KIND_RANK['rivet-nut']] as const]),
    ];
    return offered.map(([purpose, tabledMm, rank]) => ({
      purpose,
      differenceMm: Math.abs(tabledMm - diameterMm),
      rank,
    }));
  });
  return candidates
    .filter((candidate) => candidate.differenceMm <= withinMm)
    .sort((a, b) => a.differenceMm - b.differenceMm || a.rank - b.rank)
    .map(({ purpose, differenceMm }) => ({ purpose, differenceMm }));
}
