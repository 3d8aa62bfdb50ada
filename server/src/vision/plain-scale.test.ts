import sharp from 'sharp';
import { PhotoReader } from './photo-reader';

const PX_PER_MM = 300 / 25.4;

/** A scan at 300 dpi of a brown plate 60 x 40 mm with a hole of 10 mm, drawn with smooth edges. */
function scan(): Promise<Buffer> {
  const [width, height] = [100 * PX_PER_MM, 80 * PX_PER_MM].map(Math.round);
  const mm = (value: number): number => value * PX_PER_MM;
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">
    <rect width="100%" height="100%" fill="#eeeeea"/>
    <rect x="${mm(20)}" y="${mm(20)}" width="${mm(60)}" height="${mm(40)}" fill="#ac8458"/>
    <circle cx="${mm(40)}" cy="${mm(40)}" r="${mm(5)}" fill="#eeeeea"/></svg>`;
  return sharp(Buffer.from(svg)).blur(0.8).png().toBuffer();
}

describe('pictures without a scale sheet', () => {
  const reader = new PhotoReader();
  afterAll(() => reader.close());

  it('measures a scan by its resolution', async () => {
    const { trace } = await reader.read(await scan(), { thicknessMm: 3, scale: { kind: 'scan', dpi: 300 } });
    expect(trace.method).toBe('scan');
    expect(trace.outer).toHaveLength(4);
    expect(trace.holes).toHaveLength(1);
    expect(trace.holes[0]?.diameterMm).toBeCloseTo(10, 1);
    expect(trace.holes[0]?.centre[0]).toBeCloseTo(40, 1);
    expect(trace.holes[0]?.centre[1]).toBeCloseTo(40, 1);
  }, 60_000);

  it('measures by two points, and calls that rough', async () => {
    const from = { x: 20 * PX_PER_MM, y: 20 * PX_PER_MM };
    const to = { x: 80 * PX_PER_MM, y: 20 * PX_PER_MM };
    const { trace } = await reader.read(await scan(), {
      thicknessMm: 3,
      scale: { kind: 'two-points', from, to, distanceMm: 60 },
    });
    expect(trace.method).toBe('two-points');
    expect(trace.warnings.join()).toMatch(/rough/i);
    expect(trace.uncertaintyMm).toBeGreaterThan(0.5);
    expect(trace.holes[0]?.diameterMm).toBeCloseTo(10, 1);
  }, 60_000);
});
