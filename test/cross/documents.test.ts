import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import type { Development } from '@foldwright/shared/bending/development';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { planPrintTiles } from '@foldwright/shared/drawing/print-tiles';
import { developPart } from '@foldwright/shared/part/develop-part';
import { checkPart } from '@foldwright/shared/rules/check-part';
import type { DocumentInput } from '@foldwright/server/documents/document-input';
import { makeDxf } from '@foldwright/server/documents/dxf';
import { makeFullSizePrint } from '@foldwright/server/documents/full-size-print';
import { makeDrawing } from '@foldwright/server/documents/part-drawing';

// Rendering pages at 300 dpi on a busy machine takes its time.
jest.setTimeout(60_000);

/** The documented example and the demo's parts: one to four bends, openings of every kind. */
const PART_FOLDERS = ['../fixtures/parts', '../../server/src/setup/demo/parts'].map((one) =>
  path.resolve(__dirname, one),
);
const READER = path.resolve(__dirname, '../support/read_dxf.py');
const partPaths = new Map(
  PART_FOLDERS.flatMap((folder) => readdirSync(folder).map((name) => [name, path.join(folder, name)] as const)).filter(
    ([name]) => name.endsWith('.json') && !name.endsWith('expected.json'),
  ),
);
const partFiles = [...partPaths.keys()];

interface ReadEntity {
  readonly kind: string;
  readonly layer: string;
  readonly closed?: boolean;
  readonly areaMm2?: number;
  readonly lengthMm?: number;
  readonly extents?: readonly [number, number, number, number];
}
interface ReadDxf {
  readonly insunits: number;
  readonly errors: readonly string[];
  readonly fixes: readonly string[];
  readonly entities: readonly ReadEntity[];
}

function inputFor(fileName: string): DocumentInput {
  const document = partDocumentSchema.parse(JSON.parse(readFileSync(partPaths.get(fileName) ?? fileName, 'utf8')));
  const result = developPart(document, 'production');
  if (!result.ok) throw new Error(`${fileName}: ${result.problems.map((problem) => problem.message).join('; ')}`);
  return {
    partName: 'Łękowa žulička ⌀ Ø12 ½',
    partNumber: 'LC-03',
    revisionLetter: 'B',
    isDraft: false,
    hash: '0f'.repeat(32),
    releasedAt: '2026-05-12T10:00:00.000Z',
    releasedBy: 'Tomasz Wren',
    workshopName: 'Larkfield Cartworks',
    role: 'production',
    document,
    development: result.development,
    findings: checkPart(document, 'production'),
    statement: document.making.statement,
  };
}

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'foldwright-documents-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const saved = (name: string, bytes: Buffer): string => {
  const file = path.join(folder, name);
  writeFileSync(file, bytes);
  return file;
};
const tool = (command: string, args: readonly string[]): string =>
  execFileSync(command, [...args], { encoding: 'utf8', timeout: 60_000, maxBuffer: 1e8 });

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

describe.each(partFiles)('the cut file of %s, read by ezdxf', (fileName) => {
  let read: ReadDxf;
  let development: Development;

  beforeAll(async () => {
    const input = inputFor(fileName);
    development = input.development;
    const file = saved(`${fileName}.dxf`, await makeDxf(input));
    // The script's output is our own test tool's; its shape is what read_dxf.py prints.
    read = JSON.parse(tool('/usr/bin/python3', [READER, file])) as ReadDxf;
  });

  it('passes the audit and is in millimetres ($INSUNITS 4, DXF reference)', () => {
    expect(read.errors).toEqual([]);
    expect(read.fixes).toEqual([]);
    expect(read.insunits).toBe(4);
  });

  it('has one closed outline and every opening closed, nothing else on the cut layers', () => {
    const cut = read.entities.filter((entity) => entity.layer === 'OUTLINE' || entity.layer === 'OPENING');
    expect(cut.every((entity) => entity.closed === true)).toBe(true);
    expect(cut.filter((entity) => entity.layer === 'OUTLINE')).toHaveLength(1);
    expect(cut).toHaveLength(development.flat.pierces);
  });

  it('encloses the kernel’s area within 1e-6 mm² a square millimetre and cuts its length', () => {
    const of = (layer: string): number[] =>
      read.entities.filter((entity) => entity.layer === layer).map((entity) => entity.areaMm2 ?? NaN);
    const area = sum(of('OUTLINE')) - sum(of('OPENING'));
    expect(Math.abs(area - development.flat.areaMm2)).toBeLessThan(
      1e-6 * Math.max(1, Math.sqrt(development.flat.areaMm2)),
    );
    const length = sum(
      read.entities
        .filter((entity) => entity.layer === 'OUTLINE' || entity.layer === 'OPENING')
        .map((entity) => entity.lengthMm ?? NaN),
    );
    expect(length).toBeCloseTo(development.flat.cutLengthMm, 5);
  });

  it('has the kernel’s extents within 1e-6 mm', () => {
    const outline = read.entities.find((entity) => entity.layer === 'OUTLINE');
    const { min, max } = development.flat.bounds;
    const wanted = [min.x, min.y, max.x, max.y];
    outline?.extents?.forEach((value, index) => expect(Math.abs(value - (wanted[index] ?? NaN))).toBeLessThan(1e-6));
    expect(outline?.extents).toHaveLength(4);
  });

  it('puts fold lines on their own layers by direction, as many as the table says', () => {
    for (const [layer, direction] of [
      ['FOLD-TOWARD', 'towards'],
      ['FOLD-AWAY', 'away'],
    ] as const) {
      const wanted = development.flat.bends
        .filter((bend) => bend.direction === direction)
        .reduce((count, bend) => count + bend.centreLines.length, 0);
      expect(read.entities.filter((entity) => entity.layer === layer && entity.kind === 'LINE')).toHaveLength(wanted);
    }
  });
});

describe.each(partFiles)('the PDFs of %s', (fileName) => {
  const checked = (file: string): void => {
    expect(tool('qpdf', ['--check', file])).toMatch(/No syntax or stream encoding errors/);
    const fonts = tool('pdffonts', [file])
      .split('\n')
      .slice(2)
      .filter((line) => line.trim() !== '');
    expect(fonts.length).toBeGreaterThan(1);
    for (const line of fonts) expect(line).toMatch(/Plex.* yes +yes +(yes|no) /);
  };

  it('draws the part: valid, fonts embedded, the table’s figures and every source of K in its text', async () => {
    const input = inputFor(fileName);
    const file = saved(`${fileName}.drawing.pdf`, await makeDrawing(input));
    checked(file);
    const text = tool('pdftotext', ['-layout', file, '-']);
    for (const row of input.development.bendTable) {
      expect(text).toContain(row.bendAllowanceMm.toFixed(3));
      expect(text).toContain(row.bendDeductionMm.toFixed(3));
      expect(text).toContain(`K: ${row.kProvenance.text}`.slice(0, 24));
    }
    expect(text).toContain('Cut edges are sharp');
    expect(text).toContain('0f'.repeat(32));
    // Letters of the extended subset come out as themselves; a sign that no file holds becomes "?".
    expect(text).toContain('Łękowa žulička ? Ø12');
    expect(text).not.toMatch(/\bsafe\b|\bapproved\b/i);
  });

  it.each(['A4', 'Letter'] as const)(
    'prints full size on %s: valid, a sheet a tile, equal input gives equal bytes',
    async (paper) => {
      const input = inputFor(fileName);
      const bytes = await makeFullSizePrint(input, { paper });
      const file = saved(`${fileName}.${paper}.pdf`, bytes);
      checked(file);
      const pages = Number(/Pages:\s+(\d+)/.exec(tool('pdfinfo', [file]))?.[1]);
      expect(pages).toBe(planPrintTiles(input.development.flat.bounds, paper).tiles.length);
      expect((await makeFullSizePrint(input, { paper })).equals(bytes)).toBe(true);
    },
  );
});

/** Length in mm of the longest dark run in one row (or column) of pixels of a page rendered at 300 dpi. */
async function longestRun(file: string, line: { readonly row: number } | { readonly column: number }): Promise<number> {
  const { data, info } = await sharp(file).greyscale().raw().toBuffer({ resolveWithObject: true });
  const isRow = 'row' in line;
  const length = isRow ? info.width : info.height;
  let best = 0;
  let run = 0;
  for (let at = 0; at < length; at += 1) {
    const value = isRow ? data[line.row * info.width + at] : data[at * info.width + line.column];
    run = (value ?? 255) < 128 ? run + 1 : 0;
    best = Math.max(best, run);
  }
  return (best * 25.4) / 300;
}

it('prints bars that measure 100 mm within 0.1 at 300 dpi, both ways, on both papers', async () => {
  const fileName = partFiles[0];
  if (fileName === undefined) throw new Error('no part fixtures');
  for (const paper of ['A4', 'Letter'] as const) {
    const input = inputFor(fileName);
    const file = saved(`bar.${paper}.pdf`, await makeFullSizePrint(input, { paper }));
    tool('pdftoppm', ['-r', '300', '-png', '-f', '1', '-l', '1', '-singlefile', file, file]);
    const plan = planPrintTiles(input.development.flat.bounds, paper);
    const pixels = (mm: number): number => Math.round((mm * 300) / 25.4);
    const near = [-2, -1, 0, 1, 2];
    const across = await Promise.all(
      near.map((off) => longestRun(`${file}.png`, { row: pixels(plan.pageHeightMm - 16) + off })),
    );
    const up = await Promise.all(near.map((off) => longestRun(`${file}.png`, { column: pixels(8.5) + off })));
    expect(Math.abs(Math.max(...across) - 100)).toBeLessThan(0.1);
    expect(Math.abs(Math.max(...up) - 100)).toBeLessThan(0.1);
  }
});
