// What flat pattern and exact solid cost in the kernel, beside OpenCascade building the same solid in the same run.
import { developLayout } from '@foldwright/shared/bending/develop';
import type { Layout } from '@foldwright/shared/bending/layout';
import {
  cradleLayout,
  hatLayout,
  lLayout,
  sampleStock,
  tabLayout,
  trayLayout,
} from '@foldwright/shared/bending/testing/sample-layouts';
import { solidFacts } from '@foldwright/shared/solid/solid-facts';
import { solidPlan } from '@foldwright/shared/solid/solid-plan';
import { makeSolids } from '@foldwright/server/step/make-solids';
import { toothedStrip } from '../support/large-parts';
import { type Row, besideReference, measure, printRows } from './measure';

const STAMP = '2026-12-01T00:00:00';
/** The modeller's first solid in a process warms it up; the middle of the others counts. */
const REPEATS = 7;

const PARTS: readonly (readonly [string, Layout])[] = [
  ['L', lLayout()],
  ['hat', hatLayout()],
  ['tray', trayLayout()],
  ['tabs with reliefs', tabLayout()],
  ['cradle, blended sides', cradleLayout({ sideEdges: 'blended' })],
  ['60 edges, 6 bends', toothedStrip(60, 6).layout],
];

async function main(): Promise<void> {
  const stock = sampleStock();
  const rows: Row[] = [];
  for (const [name, layout] of PARTS) {
    const planned = () => {
      const result = developLayout(layout, null, stock);
      if (!result.ok) throw new Error(result.problems[0]?.message);
      return solidPlan(result.development);
    };
    const plan = planned();
    const own = await measure(() => solidFacts(planned()));
    const answers = await makeSolids({
      solids: Array.from({ length: REPEATS + 1 }, () => ({ name, plan })),
      stamp: STAMP,
    });
    const times = answers.slice(1).map((answer) => {
      if (!answer.ok) throw new Error(`${name}: ${answer.reason}`);
      return answer.builtInMs;
    });
    times.sort((a, b) => a - b);
    const [p50Ms = NaN, p95Ms = NaN] = [times[times.length >> 1], times.at(-1)];
    const built = { runs: REPEATS, p50Ms, p95Ms };
    rows.push({ what: `${name}: OpenCascade`, ...built, reference: null, ratio: null });
    rows.push(besideReference('  flat, tables and solid plan', own, 'OpenCascade', built));
    process.stdout.write(`${name}: the kernel takes 1/${(p50Ms / own.p50Ms).toFixed(0)} of the modeller's time\n`);
  }
  printRows(rows);
}

void main();
