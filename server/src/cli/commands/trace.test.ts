import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { decodePhoto, encodeForDisplay } from '../../vision/decode-photo';
import { runScaleSheet } from './scale-sheet';
import { runTrace } from './trace';

const PHOTO = join(__dirname, '../../../../test/fixtures/photos/04-strap-anchor-painted.jpg');

interface Captured {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

async function capture(run: typeof runTrace, argv: readonly string[]): Promise<Captured> {
  let out = '';
  let err = '';
  const code = await run(argv, { stdout: (text) => void (out += text), stderr: (text) => void (err += text) });
  return { code, out, err };
}

describe('trace', () => {
  it('prints one JSON object', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'trace-'));
    const small = join(folder, 'small.jpg');
    writeFileSync(small, (await encodeForDisplay((await decodePhoto(readFileSync(PHOTO))).picture, 2000)).jpeg);
    const { code, out, err } = await capture(runTrace, [small, '--thickness', '2']).finally(() =>
      rmSync(folder, { recursive: true }),
    );
    expect([code, err]).toEqual([0, '']);
    expect(JSON.parse(out)).toMatchObject({ units: 'mm', frame: 'scale-sheet', method: 'markers', cutouts: [] });
  }, 60_000);

  it.each([
    [[], /one photo is needed/],
    [['missing.jpg'], /cannot be read/],
    [[__filename], /notAPicture/],
    [[PHOTO, '--thickness', 'thick'], /--thickness must be a number/],
    [[PHOTO, '--thickness', '-1'], /thickness/i],
    [[PHOTO, '--dpi', '300', '--two-points', '0,0;1,1=20'], /only one of/],
    [[PHOTO, '--two-points', '0,0=20'], /needs 2 points/],
    [[PHOTO, '--rectangle', '100x50@1,1;2,2;3,3'], /needs 4 points/],
    [[PHOTO, '--print-scale', '1.01'], /--print-scale Y/],
    [[PHOTO, '--colour'], /colour/],
  ])('%p exits 2 with one line', async (argv, reason) => {
    const { code, out, err } = await capture(runTrace, argv);
    expect([code, out]).toEqual([2, '']);
    expect(err).toMatch(reason);
    expect(err.trim().split('\n')).toHaveLength(1);
  });
});

describe('scale-sheet', () => {
  it('writes a PDF', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'scale-sheet-'));
    try {
      const file = join(folder, 'sheet.pdf');
      expect((await capture(runScaleSheet, ['--size', 'Letter', '--variant', 'dark', '--out', file])).code).toBe(0);
      expect(readFileSync(file).subarray(0, 5).toString()).toBe('%PDF-');
    } finally {
      rmSync(folder, { recursive: true });
    }
  });

  it.each([
    [['--size', 'A3', '--out', 'x.pdf'], /--size must be A4 or Letter/],
    [['--variant', 'grey', '--out', 'x.pdf'], /--variant/],
    [[], /--out is missing/],
    [['--out', '/nowhere/at/all/x.pdf'], /ENOENT/],
  ])('%p exits 2 with one line', async (argv, reason) => {
    const { code, err } = await capture(runScaleSheet, argv);
    expect(code).toBe(2);
    expect(err).toMatch(reason);
    expect(err.trim().split('\n')).toHaveLength(1);
  });
});
