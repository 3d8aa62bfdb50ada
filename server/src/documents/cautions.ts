import type { DeclaredUse } from '@foldwright/shared/part/part-document';
import type { DocumentInput } from './document-input';

/** Usual cautions of the trade (common practice, no source); every document that ends on a bench carries them. */
const ALWAYS = [
  'Cut edges are sharp: remove burrs, break edges 0.2 to 0.5 mm, wear gloves and eye protection.',
  'Keep hands out of the press brake; follow the machine’s own instructions and your local code.',
  'Strength, fatigue and vibration are not worked out here. Where failure could hurt someone, ask a licensed engineer and follow the local code.',
] as const;

const LICENSED =
  'This use belongs to licensed practice; nothing here rates the part for it. Have it designed and inspected under the local code.';

const BY_USE: Readonly<Record<DeclaredUse, string>> = {
  vehicle:
    'On a vehicle: lock the fasteners, use at least two, inspect after the first trips; road rules of your country apply.',
  fuel: 'Near fuel: brackets and clamps only. Keep sharp edges off hoses; hoses and joints follow their own code.',
  pressure:
    'Near pressure: brackets and clamps only. Relieve the pressure before fitting; rated parts follow their own code.',
  heat: 'Near heat: work-hardened alloy and powder coat lose their properties; keep hoses and nuts with nylon away.',
  vibration:
    'Under vibration: larger radii, smooth edges, locked fasteners; cracks start at bends and nicks, so inspect.',
  'lifting-people': `Lifting people. ${LICENSED}`,
  seat: `Seats. ${LICENSED}`,
  steering: `Steering. ${LICENSED}`,
  brakes: `Brakes. ${LICENSED}`,
};

/** Cautions for one document, the declared uses' first. */
export const cautionsFor = (input: DocumentInput): readonly string[] => [
  ...input.document.declaredUses.map((use) => BY_USE[use]),
  ...ALWAYS,
];

/** What whoever fits a bought bracket is told (common practice, no source). */
const WHEN_FITTING = [
  'Edges are deburred, corners still bite: wear gloves and eye protection while you fit it.',
  'If a size or the revision differs from what is printed here, don’t fit it; ask the workshop.',
  'Strength, fatigue and vibration are not worked out. Where failure could hurt someone, ask a licensed engineer and follow the local code.',
] as const;

/** Cautions for a buyer, those of the declared uses of all brackets first. */
export const cautionsForBuyers = (uses: Iterable<DeclaredUse>): readonly string[] => [
  ...[...new Set(uses)].map((use) => BY_USE[use]),
  ...WHEN_FITTING,
];
