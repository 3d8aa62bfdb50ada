import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { makeFittingSheet } from '@foldwright/server/documents/sale/fitting-sheet';
import { makeInvoice } from '@foldwright/server/documents/sale/invoice';
import { makePackingSlip } from '@foldwright/server/documents/sale/packing-slip';
import type { DocumentPiece } from '@foldwright/server/documents/sale/sale-document';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { developPart } from '@foldwright/shared/part/develop-part';

jest.setTimeout(60_000);

const PARTS = path.resolve(__dirname, '../../server/src/setup/demo/parts');

function bracket(file: string, name: string, changes: object = {}): DocumentPiece {
  const document = partDocumentSchema.parse(JSON.parse(readFileSync(path.join(PARTS, file), 'utf8')));
  const developed = developPart(document, 'production');
  if (!developed.ok) throw new Error(`${file} can't be developed`);
  return {
    ...{ kind: 'bracket', name, number: 'LC-02', letter: 'D', hash: '0f1e2d3c4b5a'.padEnd(64, '0'), hand: 'left' },
    ...{ finishName: 'powder coat, moss', finishHex: '#4F5F3A', materialLabel: 'Aluminium 5052-H32, 3 mm' },
    ...{ development: developed.development, quantity: 1 },
    ...changes,
  } as DocumentPiece;
}

const head = {
  shopName: 'Larkfield Cartworks',
  senderAddress: 'Larkfield Cartworks\nHopper Lane 3\nWestmere',
  saleNumber: 1042,
  placedAt: new Date('2026-05-14T10:00:00Z'),
  customerLines: ['Łucja Żurek-Ørsted', 'Quay Row 8', '1042 Westmere', 'IE'],
};
const pieces: readonly DocumentPiece[] = [
  bracket('pump-tray.json', 'Pump tray'),
  bracket('regulator-bracket.json', 'Regulator bracket', { letter: 'B' }),
  bracket('battery-strap-anchor.json', 'Battery strap anchor', { finishHex: null, finishName: 'bare, deburred' }),
  { kind: 'hardware', name: 'Socket screw M5 × 16', specification: 'ISO 4762, stainless', quantity: 8 },
];

describe('documents about a sale, read by other programs', () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(path.join(os.tmpdir(), 'sale-documents-'));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  /** Checks a file as a whole, and answers its words and its pages. */
  function read(name: string, bytes: Buffer): { readonly text: string; readonly pages: number } {
    const file = path.join(folder, name);
    writeFileSync(file, bytes);
    execFileSync('qpdf', ['--check', file]);
    const fonts = execFileSync('pdffonts', [file], { encoding: 'utf8' }).trim().split('\n').slice(2);
    expect(fonts.length).toBeGreaterThan(0);
    for (const font of fonts) expect(font).toMatch(/\byes\b/);
    const pages = Number(/^Pages:\s+(\d+)/m.exec(execFileSync('pdfinfo', [file], { encoding: 'utf8' }))?.[1]);
    return { text: execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' }), pages };
  }

  it('the packing slip names revision, hand, finish and fingerprint of each bracket, and what is to come', async () => {
    const bytes = await makePackingSlip({
      ...{
        head,
        parcel: 1,
        carrier: 'Harbour Post',
        trackingCode: 'HP 77',
        shippedAt: new Date('2026-05-16T10:00:00Z'),
      },
      ...{ inside: pieces, toCome: [bracket('sign-bracket.json', 'Sign bracket')] },
    });
    const { text, pages } = read('slip.pdf', bytes);
    expect(pages).toBe(1);
    for (const words of [
      'Order',
      '1042',
      'Revision D',
      'Revision B',
      'left hand',
      'powder coat, moss',
      '0f1e2d3c4b5a',
    ]) {
      expect(text).toContain(words);
    }
    expect(text).toContain('1 × Sign bracket, revision D');
    expect(text).toContain('Łucja Żurek-Ørsted');
    expect(text).toContain('Harbour Post, HP 77');
  });

  it('the invoice adds up to the cent', async () => {
    const bytes = await makeInvoice({
      ...{ head, paidAt: new Date('2026-05-14T11:00:00Z'), currency: 'EUR', postageMinor: 690, taxName: 'VAT' },
      ...{ taxBasisPoints: 2300, taxNumber: 'XX 1', taxMinor: 2896, totalMinor: 15490, refundedMinor: 3400 },
      lines: [{ words: 'Two-pump water kit, moss', quantity: 1, eachMinor: 14800, totalMinor: 14800, taxMinor: 2767 }],
    });
    const { text } = read('invoice.pdf', bytes);
    for (const words of ['€148.00', '€27.67', '€6.90', '€1.29', '€154.90', '€125.94', '€28.96', '-€34.00', '€120.90']) {
      expect(text).toContain(words);
    }
  });

  it('the fitting sheet begins with the cautions and runs over as many pages as it needs', async () => {
    const steps = Array.from(
      { length: 24 },
      (_, at) => `Step ${at + 1}: fasten it with two screws and look at it twice.`,
    );
    const bytes = await makeFittingSheet({
      head,
      parts: [
        { title: 'Two-pump water kit', quantity: 2, pieces, steps },
        { title: 'Regulator bracket', quantity: 1, pieces: [pieces[1] as DocumentPiece], steps: [] },
      ],
      cautions: ['Near pressure: relieve the pressure before fitting.', 'Corners still bite: wear gloves.'],
    });
    const { text, pages } = read('fitting.pdf', bytes);
    expect(pages).toBeGreaterThan(1);
    expect(text.indexOf('relieve the pressure')).toBeLessThan(text.indexOf('Two-pump water kit'));
    expect(text).toContain('24.');
    expect(text).toContain(`2 of ${pages}`);
  });
});
