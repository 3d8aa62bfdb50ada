// What it costs to ask whether every bolt starts: 2,000 formed hats with their bolts, bare and coated, beside forming them alone. Aim:
// below 50 ms.
import { STANDARD_BRAKE } from '@foldwright/shared/bending/leg-gains';
import { boltChance, formParts } from '@foldwright/shared/assembly/bolt-chance';
import { patternModel } from '@foldwright/shared/assembly/bolt-pattern';
import { proposeSlot } from '@foldwright/shared/assembly/propose-slot';
import { developed } from '@foldwright/shared/bending/testing/developed';
import { hatLayout } from '@foldwright/shared/bending/testing/sample-layouts';
import { withHoles } from '@foldwright/shared/spread/testing/spread-parts';
import { type Row, besideReference, measure, printRows } from './measure';

const COAT = { lowMm: 0.06, highMm: 0.12 };
const PARTS = 2000;

const PATTERNS: readonly (readonly [string, readonly (readonly [number, number])[]])[] = [
  [
    'two bolts',
    [
      [10, 20],
      [130, 20],
    ],
  ],
  [
    'three bolts',
    [
      [10, 20],
      [130, 8],
      [130, 32],
    ],
  ],
  [
    'four bolts',
    [
      [10, 8],
      [130, 8],
      [10, 32],
      [130, 32],
    ],
  ],
];

async function main(): Promise<void> {
  const rows: Row[] = [];
  for (const [label, places] of PATTERNS) {
    const development = developed(withHoles(hatLayout(20, 25, 50, { kFactor: 0.42 }), places));
    const plan = { brake: STANDARD_BRAKE, coat: COAT, gauging: new Map() };
    const bolts = places.map((_, index) => ({ featureId: `h${String(index + 1)}`, boltMm: 6, at: null }));
    const model = patternModel(development, plan, { bolts, placeHalfWidthMm: 0 });
    const forming = await measure(() => formParts(model, COAT, 5, PARTS));
    const formed = formParts(model, COAT, 5, PARTS);
    rows.push(
      besideReference(
        `hat, ${label}: will every bolt start`,
        await measure(() => boltChance(model, COAT, 5, PARTS)),
        'forming 2,000 parts',
        forming,
      ),
      besideReference(
        '  a slot proposed',
        await measure(() => proposeSlot(formed, 0.99)),
        'forming 2,000 parts',
        forming,
      ),
    );
  }
  printRows(rows);
}

void main();
