import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { findMarkers } from '../../vision/find-markers';
import { MARKER_SIDE_MM, scaleSheetLayout, type SheetSize, type SheetVariant } from '../../vision/scale-sheet-layout';
import { makeScaleSheet } from './scale-sheet';

const KINDS: readonly (readonly [SheetSize, SheetVariant])[] = [
  ['A4', 'light'],
  ['A4', 'dark'],
  ['Letter', 'light'],
  ['Letter', 'dark'],
];
const DPI = 150;
const PX_PER_MM = DPI / 25.4;

/** The page as Poppler draws it, grey. */
async function raster(pdf: Buffer): Promise<{ widthPx: number; heightPx: number; grey: Uint8Array }> {
  const folder = mkdtempSync(join(tmpdir(), 'scale-sheet-'));
  try {
    writeFileSync(join(folder, 'sheet.pdf'), pdf);
    execFileSync('pdftoppm', ['-r', String(DPI), '-png', '-singlefile', 'sheet.pdf', 'sheet'], { cwd: folder });
    const { data, info } = await sharp(readFileSync(join(folder, 'sheet.png')))
      .greyscale()
      .raw()
      .toBuffer({ resolveWithObject: true });
    return { widthPx: info.width, heightPx: info.height, grey: new Uint8Array(data) };
  } finally {
    rmSync(folder, { recursive: true });
  }
}

describe.each(KINDS)('scale sheet %s %s', (size, variant) => {
  const layout = scaleSheetLayout(size, variant);

  it('is the same bytes every time', async () => {
    const [a, b] = await Promise.all([makeScaleSheet({ size, variant }), makeScaleSheet({ size, variant })]);
    expect(a.equals(b)).toBe(true);
  });

  it('shows every marker where the layout says, and both rulers 100 mm long', async () => {
    const page = await raster(await makeScaleSheet({ size, variant }));
    const { markers, mirroredCount } = findMarkers(page);
    expect(mirroredCount).toBe(0);
    expect(markers.map(({ id }) => id)).toEqual(layout.markers.map(({ id }) => id));
    for (const { id, corners } of markers) {
      const placed = layout.markers.find((marker) => marker.id === id);
      const topLeft = {
        x: (placed?.x ?? 0) * PX_PER_MM,
        y: (layout.heightMm - (placed?.y ?? 0) - MARKER_SIDE_MM) * PX_PER_MM,
      };
      expect(Math.hypot(corners[0].x - topLeft.x, corners[0].y - topLeft.y)).toBeLessThan(2);
    }
    const across = layout.rulers.find(({ along }) => along === 'x');
    const row = Math.round((layout.heightMm - (across?.y ?? 0) - (across?.heightMm ?? 0) / 10) * PX_PER_MM);
    const dark: number[] = [];
    for (let x = 0; x < page.widthPx; x++) if ((page.grey[row * page.widthPx + x] ?? 255) < 160) dark.push(x);
    expect(Math.abs(((dark.at(-1) ?? 0) - (dark[0] ?? 0)) / PX_PER_MM - 100)).toBeLessThan(0.3);
  });

  it('embeds its typeface and says how to print', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'scale-sheet-'));
    try {
      writeFileSync(join(folder, 'sheet.pdf'), await makeScaleSheet({ size, variant }));
      const run = (command: string, ...args: readonly string[]): string =>
        execFileSync(command, args, { cwd: folder, encoding: 'utf8' });
      expect(run('qpdf', '--check', 'sheet.pdf')).toMatch(/No syntax or stream encoding errors/);
      const fonts = run('pdffonts', 'sheet.pdf').trim().split('\n').slice(2);
      expect(fonts.length).toBeGreaterThanOrEqual(2);
      for (const font of fonts) expect(font).toMatch(/IBMPlexSans.*yes yes/);
      expect(run('pdftotext', 'sheet.pdf', '-')).toMatch(/Print at 100 %/);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});

describe('layout', () => {
  it('keeps every marker clear of the others, of words, rulers and the work area', () => {
    for (const [size, variant] of KINDS) {
      const { markers, wordBoxes, rulers, workArea, widthMm, heightMm } = scaleSheetLayout(size, variant);
      expect(markers).toHaveLength(22);
      const boxes = markers.map(({ x, y }) => ({
        x: x - 2,
        y: y - 2,
        widthMm: MARKER_SIDE_MM + 4,
        heightMm: MARKER_SIDE_MM + 4,
      }));
      for (const box of boxes) {
        expect(box.x).toBeGreaterThan(0);
        expect(box.x + box.widthMm).toBeLessThan(widthMm);
        expect(box.y + box.heightMm).toBeLessThan(heightMm);
        for (const other of [...wordBoxes, ...rulers, workArea]) {
          const isApart =
            box.x + box.widthMm <= other.x + 1e-6 ||
            other.x + other.widthMm <= box.x + 1e-6 ||
            box.y + box.heightMm <= other.y + 1e-6 ||
            other.y + other.heightMm <= box.y + 1e-6;
          expect(isApart).toBe(true);
        }
      }
    }
  });
});
