// What the kernel costs as parts grow: flat pattern, tables, checks and mesh together, and the exponent of the growth. Mends are tried
// on the part before they are offered, which a drawing that a hand is moving leaves out; that is a row of its own.
import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { checkDevelopedPart } from '@foldwright/shared/rules/check-part';
import { toothedStrip } from '../support/large-parts';
import { type Row, besideReference, measure, printRows } from './measure';

/** Flat pattern and tables, checks, mesh: what an edit costs. */
function everything(document: PartDocument, mends: 'offered' | 'left out' = 'left out'): void {
  const result = developPart(document, 'production');
  if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join(' '));
  checkDevelopedPart(document, 'production', result, mends);
  poseFormed(layOutMesh(result.development), 1);
}

/** Slope of log time over log size: 1 is linear. */
function exponentOf(points: readonly { readonly size: number; readonly ms: number }[]): number {
  const logs = points.map(({ size, ms }) => ({ x: Math.log(size), y: Math.log(ms) }));
  const mean = { x: 0, y: 0 };
  for (const { x, y } of logs) {
    mean.x += x / logs.length;
    mean.y += y / logs.length;
  }
  const up = logs.reduce((sum, { x, y }) => sum + (x - mean.x) * (y - mean.y), 0);
  return up / logs.reduce((sum, { x }) => sum + (x - mean.x) ** 2, 0);
}

async function main(): Promise<void> {
  const rows: Row[] = [];
  const reference = 'JSON there and back';
  for (const { edges, bends } of [
    { edges: 60, bends: 6 },
    { edges: 2000, bends: 20 },
  ]) {
    const document = toothedStrip(edges, bends);
    const json = await measure(() => JSON.parse(JSON.stringify(document)) as unknown);
    const label = `${document.layout.outer.edges.length} edges, ${bends} bends: all`;
    rows.push(besideReference(label, await measure(() => everything(document)), reference, json));
    const tried = await measure(() => everything(document, 'offered'), { runs: 20, warmUp: 3 });
    rows.push(besideReference('  and every mend tried', tried, reference, json));
  }
  const growth: { size: number; ms: number }[] = [];
  for (const edges of [100, 300, 1000, 3000, 10_000]) {
    const document = toothedStrip(edges, 6);
    const size = document.layout.outer.edges.length;
    const json = await measure(() => JSON.parse(JSON.stringify(document)) as unknown, { runs: 20 });
    const timing = await measure(() => everything(document), { runs: edges > 2000 ? 10 : 30, warmUp: 3 });
    growth.push({ size, ms: timing.p50Ms });
    rows.push(besideReference(`growth: ${size} edges, 6 bends`, timing, reference, json));
  }
  printRows(rows);
  process.stdout.write(`fitted exponent from 100 to 10,000 edges: ${exponentOf(growth).toFixed(2)}\n`);
}

void main();
