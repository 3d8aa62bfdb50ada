import type { Feature, HolePurpose } from '@foldwright/shared/bending/layout';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { formatDecimal } from '@foldwright/shared/units/length';
import type { PictogramName } from '@foldwright/ui/pictogram/pictogram-paths';

/** One line of the part card: "4 × M5 and 2 × M6 clearance". */
export interface HoleLine {
  readonly icon: PictogramName;
  readonly text: string;
}

interface Kind {
  readonly icon: PictogramName;
  readonly word: string;
}

const KINDS: Readonly<Record<HolePurpose['kind'], Kind>> = {
  clearance: { icon: 'clearance-hole', word: 'clearance' },
  tapped: { icon: 'tapped-hole', word: 'tapped' },
  'rivet-nut': { icon: 'rivet-nut', word: 'rivet nut' },
  countersunk: { icon: 'countersink', word: 'countersunk' },
  'pass-through': { icon: 'hose-pass-through', word: 'pass-through' },
  plain: { icon: 'clearance-hole', word: 'plain' },
  lightening: { icon: 'lightening', word: 'lightening' },
};

/** Holes and slots of a part by kind, each kind in one line with the sizes counted. */
export function holeLines(features: readonly Feature[]): readonly HoleLine[] {
  const byKind = new Map<string, { readonly kind: Kind; readonly counts: Map<string, number> }>();
  for (const feature of features) {
    const { key, kind, size } = describe(feature);
    const entry = byKind.get(key) ?? { kind, counts: new Map<string, number>() };
    entry.counts.set(size, (entry.counts.get(size) ?? 0) + 1);
    byKind.set(key, entry);
  }
  return [...byKind.values()].map(({ kind, counts }) => {
    const sizes = [...counts.entries()].map(([size, count]) => (count === 1 ? size : `${count} × ${size}`));
    return { icon: kind.icon, text: `${listed(sizes)} ${kind.word}` };
  });
}

/** What a purpose is called, for menus and lists. */
export function purposeWord(kind: HolePurpose['kind']): string {
  return KINDS[kind].word;
}

/** The sign of a purpose. */
export function purposeIcon(kind: HolePurpose['kind']): PictogramName {
  return KINDS[kind].icon;
}

function describe(feature: Feature): { readonly key: string; readonly kind: Kind; readonly size: string } {
  if (feature.kind === 'slot') {
    const lengthMm = Math.hypot(feature.to.x - feature.from.x, feature.to.y - feature.from.y) + feature.widthMm;
    const size = `${formatDecimal(feature.widthMm, 1)} × ${formatDecimal(lengthMm, 1)}`;
    return { key: 'slot', kind: { icon: 'slot', word: 'slot' }, size };
  }
  const { purpose } = feature;
  const diameterMm = findHoleDiameterMm(purpose) ?? 0;
  const size = 'thread' in purpose ? purpose.thread : `Ø ${formatDecimal(diameterMm, 2)}`;
  return { key: purpose.kind, kind: KINDS[purpose.kind], size };
}

function listed(words: readonly string[]): string {
  if (words.length < 2) return words[0] ?? '';
  return `${words.slice(0, -1).join(', ')} and ${words.at(-1) ?? ''}`;
}
