import type { Development, Provenance } from '../bending/development';
import type { PieceName } from '../brake/plates';
import { findSelfInterference } from '../brake/self-interference';
import type { Interference } from '../brake/self-interference';
import { interiorPoint } from '../geometry/interior-point';
import type { Finding } from './finding';
import { capital } from './in-words';
import { pieceInWords } from './piece-in-words';
import { type RuleContext, placeOfFlat } from './rule-context';

const WHY: Provenance = {
  text: 'two pieces of sheet cannot be in the same place; up to 0.02 mm counts as touching',
  source: 'geometry of the formed part',
  confidence: 'published',
};

/** Pieces of the fully folded part that overlap. Nobody can fold such a part, whatever the order. */
export function checkSelfInterference(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  const found = findSelfInterference(development);
  return found
    .filter((one) => !isToldByPanels(development, one, found))
    .map(({ first, second }) => {
      const [a, b] = [first, second].map((piece) => pieceInWords(context, development, piece));
      const panel = development.panels[panelsOf(development, second).at(-1) ?? 0];
      const inside = panel === undefined ? null : interiorPoint(panel.outer, panel.openings);
      return {
        id: `selfInterference-${first.kind}-${first.index}-${second.kind}-${second.index}`,
        rule: 'selfInterference',
        severity: 'blocker',
        title: capital(`${a ?? ''} runs into ${b ?? ''}`),
        detail: 'Folded as drawn, both would be in the same place.',
        foundMm: null,
        requiredMm: null,
        why: WHY,
        ids: bendsOf(development, [first, second]),
        at: inside === null ? null : placeOfFlat(development, inside),
        advice: 'Shorten one of them, cut room for it into the other, or fold one the other way.',
        mend: null,
      };
    });
}

/** Where two panels meet, their bends often meet too: that is told once. */
function isToldByPanels(development: Development, one: Interference, all: readonly Interference[]): boolean {
  if (one.first.kind === 'panel' && one.second.kind === 'panel') return false;
  const firsts = panelsOf(development, one.first);
  const seconds = panelsOf(development, one.second);
  return all.some(
    ({ first, second }) =>
      first.kind === 'panel' &&
      second.kind === 'panel' &&
      ((firsts.includes(first.index) && seconds.includes(second.index)) ||
        (firsts.includes(second.index) && seconds.includes(first.index))),
  );
}

function panelsOf({ zones }: Development, { kind, index }: PieceName): readonly number[] {
  const zone = kind === 'zone' ? zones[index] : undefined;
  return zone === undefined ? [index] : [zone.parentIndex, zone.childIndex];
}

function bendsOf({ panels, zones }: Development, pieces: readonly PieceName[]): readonly string[] {
  const ids = pieces.flatMap(
    ({ kind, index }) => (kind === 'zone' ? zones[index]?.bendId : panels[index]?.bendId) ?? [],
  );
  return [...new Set(ids)];
}
