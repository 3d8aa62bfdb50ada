// What the kernel costs for each demo part: the whole of it, and its stages, beside reading the document from JSON.
import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { developPart } from '@foldwright/shared/part/develop-part';
import { checkPart } from '@foldwright/shared/rules/check-part';
import { type Row, besideReference, measure, printRows } from './measure';

const PARTS = path.resolve(__dirname, '../../server/src/setup/demo/parts');

async function main(): Promise<void> {
  const rows: Row[] = [];
  for (const name of readdirSync(PARTS)) {
    const text = readFileSync(path.join(PARTS, name), 'utf8');
    const document = partDocumentSchema.parse(JSON.parse(text));
    const result = developPart(document, 'production');
    if (!result.ok) throw new Error(`${name} can't be developed`);
    const mesh = layOutMesh(result.development);
    const edges = document.layout.outer.edges.length;
    const label = `${path.basename(name, '.json')} (${edges} edges, ${document.layout.bends.length} bends)`;
    const reading = await measure(() => partDocumentSchema.parse(JSON.parse(text)));
    const reference = 'reading its document';
    rows.push(
      besideReference(`${label}: flat`, await measure(() => developPart(document, 'production')), reference, reading),
      besideReference(
        '  checks, flat included',
        await measure(() => checkPart(document, 'production')),
        reference,
        reading,
      ),
      besideReference('  mesh laid out', await measure(() => layOutMesh(result.development)), reference, reading),
      besideReference('  mesh posed, one frame', await measure(() => poseFormed(mesh, 0.6)), reference, reading),
    );
  }
  printRows(rows);
}

void main();
