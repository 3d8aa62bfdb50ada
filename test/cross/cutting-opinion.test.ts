import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { sheetCodeOf } from '@foldwright/server/cutting/sheet-codes';
import { makeDxf } from '@foldwright/server/documents/dxf';
import { judgeRequest } from '@foldwright/server/fakes/cutting-service/judge-request';
import { readDrawing } from '@foldwright/server/fakes/cutting-service/read-drawing';
import { computePart } from '@foldwright/server/services/computed-part';
import { readStoredDocument } from '@foldwright/server/services/stored-document';

const PARTS = path.resolve(__dirname, '../../server/src/setup/demo/parts');

/** The drawing of a demo part as the shop reads it, beside what our kernel says of the same part. */
async function askAbout(name: string) {
  const document = readStoredDocument(JSON.parse(await readFile(path.join(PARTS, `${name}.json`), 'utf8')));
  const { development, findings } = computePart(document, 'production');
  if (development === null) throw new Error(`${name} can’t be unfolded`);
  const dxf = await makeDxf({
    partName: name,
    partNumber: 'LC-00',
    revisionLetter: 'A',
    isDraft: false,
    hash: '0'.repeat(64),
    releasedAt: '2026-03-02T08:00:00.000Z',
    releasedBy: 'Imogen Harrow',
    workshopName: 'Larkfield Cartworks',
    role: 'production',
    document,
    development,
    findings,
    statement: document.making.statement,
  });
  const { materialId, thicknessMm } = document.stocks.production;
  const request = {
    reference: 'r',
    partName: name,
    dxf: dxf.toString('latin1'),
    material: sheetCodeOf(materialId),
    thicknessMm,
    quantities: [1],
    currency: 'EUR' as const,
    statement: document.making.statement,
    bends: development.bendTable.map((row) => ({
      name: row.name,
      angleDeg: row.bendAngleDeg,
      direction: row.direction === 'towards' ? ('toward' as const) : ('away' as const),
      insideRadiusMm: row.insideRadiusMm,
      lengthMm: row.bendLengthMm,
    })),
  };
  return { flat: development.flat, judgement: judgeRequest(request, readDrawing(request.dxf)) };
}

describe('the cutting shop measures our drawings by itself', () => {
  it.each(['battery-strap-anchor', 'grinder-cradle', 'pump-tray', 'regulator-bracket', 'sign-bracket'])(
    'and finds the kernel’s sizes in the %s',
    async (name) => {
      const { flat, judgement } = await askAbout(name);
      if (!judgement.canMake) throw new Error(judgement.reasons.map(({ text }) => text).join(' '));
      const { readings } = judgement;
      expect(readings.widthMm).toBeCloseTo(flat.bounds.max.x - flat.bounds.min.x, 6);
      expect(readings.heightMm).toBeCloseTo(flat.bounds.max.y - flat.bounds.min.y, 6);
      expect(readings.cutLengthMm).toBeCloseTo(flat.cutLengthMm, 5);
      expect(readings.pierces).toBe(flat.pierces);
    },
  );
});
