import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Trace, TraceRefusalCode } from '@foldwright/shared/fitting/trace';
import sharp from 'sharp';
import { PhotoReader } from './photo-reader';
import type { ReadingOptions } from './reading-options';
import { TraceRefusal } from './trace-refusal';

const FIXTURE = join(__dirname, '../../../test/fixtures/photos/01-pump-tray-corrugated.jpg');
const OPTIONS = { thicknessMm: 3 };
const SECONDS = 1000;
// In its own process, where code runs several times faster than inside the test runner.
const reader = new PhotoReader();
afterAll(() => reader.close());

interface Pixels {
  readonly width: number;
  readonly height: number;
  readonly rgb: Buffer;
}

async function smallPixels(widthPx: number): Promise<Pixels> {
  const { data, info } = await sharp(FIXTURE)
    .resize({ width: widthPx })
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return { width: info.width, height: info.height, rgb: data };
}

async function encode({ width, height, rgb }: Pixels, orientation?: number): Promise<Buffer> {
  const picture = sharp(rgb, { raw: { width, height, channels: 3 } }).jpeg({ quality: 95, chromaSubsampling: '4:4:4' });
  return (orientation === undefined ? picture : picture.withMetadata({ orientation })).toBuffer();
}

/** Pixels to store so that a viewer obeying the EXIF orientation shows `shown` (EXIF 2.3, tag 274). */
function storedFor(shown: Pixels, orientation: number): Pixels {
  const isTurned = orientation >= 5;
  const width = isTurned ? shown.height : shown.width;
  const height = isTurned ? shown.width : shown.height;
  const rgb = Buffer.alloc(shown.rgb.length);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const right = shown.width - 1;
      const below = shown.height - 1;
      const [u, v] = (
        {
          1: [x, y],
          2: [right - x, y],
          3: [right - x, below - y],
          4: [x, below - y],
          5: [y, x],
          6: [right - y, x],
          7: [right - y, below - x],
          8: [y, below - x],
        } as Readonly<Record<number, readonly [number, number]>>
      )[orientation] ?? [x, y];
      shown.rgb.copy(rgb, (y * width + x) * 3, (v * shown.width + u) * 3, (v * shown.width + u) * 3 + 3);
    }
  }
  return { width, height, rgb };
}

async function refusalOf(bytes: Buffer): Promise<TraceRefusalCode | string> {
  try {
    await reader.read(bytes, OPTIONS);
    return 'read';
  } catch (error) {
    if (error instanceof TraceRefusal) return error.code;
    throw error;
  }
}

function flat(background: { r: number; g: number; b: number }, width = 1200, height = 900): Promise<Buffer> {
  return sharp({ create: { width, height, channels: 3, background } })
    .jpeg()
    .toBuffer();
}

function places(trace: Trace): readonly number[] {
  return trace.holes.flatMap((hole) => [...hole.centre, hole.diameterMm]);
}

function sizeOf(trace: Trace): readonly [number, number] {
  const span = (axis: 0 | 1): number => {
    const values = trace.outer.map((primitive) => primitive.from[axis]);
    return Math.max(...values) - Math.min(...values);
  };
  return [span(0), span(1)];
}

describe('reading a photo', () => {
  it(
    'gives the same trace in all eight orientations',
    async () => {
      const shown = await smallPixels(2000);
      const upright = await reader.read(await encode(shown), OPTIONS);
      expect(upright.trace.holes).toHaveLength(5);
      for (let orientation = 1; orientation <= 8; orientation++) {
        const { trace } = await reader.read(await encode(storedFor(shown, orientation), orientation), OPTIONS);
        const seen = places(trace);
        const expected = places(upright.trace);
        expect(sizeOf(trace)[0]).toBeCloseTo(sizeOf(upright.trace)[0], 1);
        expect(sizeOf(trace)[1]).toBeCloseTo(sizeOf(upright.trace)[1], 1);
        expect(seen).toHaveLength(expected.length);
        seen.forEach((value, index) => expect(Math.abs(value - (expected[index] ?? 0))).toBeLessThan(0.03));
      }
    },
    180 * SECONDS,
  );

  it(
    'hands back pictures without metadata, an outline on them, and the stages in order',
    async () => {
      const stages: string[] = [];
      const bytes = await encode(storedFor(await smallPixels(2000), 6), 6);
      const reading = await reader.read(bytes, OPTIONS, { onStage: (stage) => stages.push(stage) });
      expect(stages).toEqual(['decode', 'markers', 'square-up', 'template', 'outline', 'holes']);
      const display = await sharp(reading.display.jpeg).metadata();
      expect(display.exif).toBeUndefined();
      expect([display.width, display.height]).toEqual([reading.display.widthPx, reading.display.heightPx]);
      const rectified = await sharp(reading.rectified.jpeg).metadata();
      expect(rectified.width).toBeCloseTo(reading.rectified.widthMm * reading.rectified.pixelsPerMm, 0);
      expect(reading.photoOutline).toHaveLength(1 + 5 + 2 + 1);
      for (const { x, y } of reading.photoOutline.flat()) {
        expect(x).toBeGreaterThan(0);
        expect(x).toBeLessThan(reading.display.widthPx);
        expect(y).toBeGreaterThan(0);
        expect(y).toBeLessThan(reading.display.heightPx);
      }
    },
    60 * SECONDS,
  );

  it(
    'stretches with the print',
    async () => {
      const bytes = await encode(await smallPixels(2000));
      const plain = await reader.read(bytes, OPTIONS);
      const stretched = await reader.read(bytes, { ...OPTIONS, printScale: [1.01, 1.01] });
      expect(sizeOf(stretched.trace)[0] / sizeOf(plain.trace)[0]).toBeCloseTo(1.01, 3);
    },
    60 * SECONDS,
  );

  it(
    'takes a known rectangle for the scale, and says what that is worth',
    async () => {
      const truth = JSON.parse(readFileSync(FIXTURE.replace('.jpg', '.truth.json'), 'utf8')) as {
        camera: {
          rotationPageToCamera: number[][];
          centreMm: number[];
          focalLengthPx: number;
          principalPointPx: number[];
          k1: number;
        };
        holes: { centre: [number, number]; diameterMm: number }[];
      };
      const see = (x: number, y: number): { x: number; y: number } => {
        const { rotationPageToCamera, centreMm, focalLengthPx, principalPointPx, k1 } = truth.camera;
        const [u = 0, v = 0, w = 1] = rotationPageToCamera.map((row) =>
          row.reduce((sum, r, k) => sum + r * (([x, y, 0][k] ?? 0) - (centreMm[k] ?? 0)), 0),
        );
        const factor = 1 + k1 * ((u / w) ** 2 + (v / w) ** 2);
        return {
          x: (u / w) * factor * focalLengthPx + (principalPointPx[0] ?? 0),
          y: (v / w) * factor * focalLengthPx + (principalPointPx[1] ?? 0),
        };
      };
      const read = async (scale: NonNullable<ReadingOptions['scale']>): Promise<Trace> =>
        (await reader.read(readFileSync(FIXTURE), { ...OPTIONS, scale })).trace;
      // A rectangle of bare paper round the template, its corner 27 mm in from the page's.
      const inset = 27;
      const [left, right, foot, head] = [inset, 210 - inset, inset, 297 - inset];
      const rectangle = await read({
        kind: 'rectangle',
        widthMm: right - left,
        heightMm: head - foot,
        corners: [see(left, foot), see(right, foot), see(right, head), see(left, head)],
      });
      expect(rectangle.method).toBe('rectangle');
      expect(rectangle.warnings.join()).toMatch(/lens/);
      expect(rectangle.holes).toHaveLength(truth.holes.length);
      for (const { centre } of truth.holes) {
        const misses = rectangle.holes.map((hole) =>
          Math.hypot(hole.centre[0] + inset - centre[0], hole.centre[1] + inset - centre[1]),
        );
        expect(Math.min(...misses)).toBeLessThan(2);
      }
    },
    60 * SECONDS,
  );
});

describe('refusals', () => {
  it('of what is no picture', async () => {
    expect(await refusalOf(Buffer.from('hello'))).toBe('notAPicture');
    expect(await refusalOf(Buffer.alloc(0))).toBe('notAPicture');
    expect(await refusalOf(Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="900" height="900"/>'))).toBe(
      'notAPicture',
    );
    expect(await refusalOf(readFileSync(FIXTURE).subarray(0, 200_000))).toBe('notAPicture');
  });

  it('of more bytes or pixels than are taken', async () => {
    expect(await refusalOf(Buffer.alloc(25 * 1024 * 1024 + 1))).toBe('tooLarge');
    const wide = await sharp({ create: { width: 9000, height: 6000, channels: 3, background: '#fff' } })
      .png()
      .toBuffer();
    expect(await refusalOf(wide)).toBe('tooLarge');
  });

  it('of a photo without a sheet, and of a dark one', async () => {
    expect(await refusalOf(await flat({ r: 230, g: 228, b: 220 }))).toBe('noMarkers');
    expect(await refusalOf(await flat({ r: 6, g: 6, b: 7 }))).toBe('tooDark');
  });

  it('of a mirrored sheet', async () => {
    expect(await refusalOf(await sharp(FIXTURE).resize({ width: 2000 }).flop().jpeg().toBuffer())).toBe(
      'mirroredPrint',
    );
  });

  it('of a blurred photo', async () => {
    expect(await refusalOf(await sharp(FIXTURE).blur(7).jpeg().toBuffer())).toBe('blurred');
  }, 30_000);

  it('of a sheet with nothing on it', async () => {
    const raster = await sharp(readFileSync(FIXTURE))
      .resize({ width: 2000 })
      .removeAlpha()
      .raw()
      .toBuffer({ resolveWithObject: true });
    const { data, info } = raster;
    // Paint the template over with paper: everything browner than paper becomes light grey.
    for (let k = 0; k < data.length; k += 3) {
      const isBrown = (data[k] ?? 0) - (data[k + 2] ?? 0) > 14;
      if (isBrown) data.fill(200, k, k + 3);
    }
    const bare = await sharp(data, { raw: { width: info.width, height: info.height, channels: 3 } })
      .blur(1.5)
      .jpeg()
      .toBuffer();
    expect(await refusalOf(bare)).toMatch(/noTemplate/);
  }, 30_000);
});
