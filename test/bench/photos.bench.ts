// What reading a photo costs, beside the mere decoding of the same file by sharp.
import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { PhotoReader } from '@foldwright/server/vision/photo-reader';
import { type Row, besideReference, measure, printRows } from './measure';

const PHOTOS = path.resolve(__dirname, '../fixtures/photos');
const FEW = { runs: 5, warmUp: 1 };

async function main(): Promise<void> {
  const reader = new PhotoReader();
  const rows: Row[] = [];
  for (const name of readdirSync(PHOTOS).filter((file) => file.endsWith('.jpg'))) {
    const bytes = readFileSync(path.join(PHOTOS, name));
    const truth: unknown = JSON.parse(readFileSync(path.join(PHOTOS, name.replace(/jpg$/, 'truth.json')), 'utf8'));
    const thicknessMm =
      typeof truth === 'object' && truth !== null && 'thicknessMm' in truth ? Number(truth.thicknessMm) : 0;
    const decoding = await measure(() => sharp(bytes).raw().toBuffer(), FEW);
    const reading = await measure(() => reader.read(bytes, { thicknessMm }), FEW);
    rows.push(besideReference(path.basename(name, '.jpg'), reading, 'decoding it', decoding));
  }
  printRows(rows);
  await reader.close();
}

void main();
