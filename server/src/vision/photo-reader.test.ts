import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { PhotoReader, PhotoReaderFailure } from './photo-reader';
import { TraceRefusal } from './trace-refusal';

const PHOTO = readFileSync(join(__dirname, '../../../test/fixtures/photos/04-strap-anchor-painted.jpg'));
const OPTIONS = { thicknessMm: 2 };

describe('the process that reads photos', () => {
  let reader: PhotoReader;
  beforeEach(() => {
    reader = new PhotoReader();
  });
  afterEach(() => reader.close());

  it('streams the stages and hands back the reading', async () => {
    const stages: string[] = [];
    const reading = await reader.read(PHOTO, OPTIONS, { onStage: (stage) => stages.push(stage) });
    expect(stages).toEqual(['decode', 'markers', 'square-up', 'template', 'outline', 'holes']);
    expect(reading.trace.holes).toHaveLength(3);
    expect(Buffer.from(reading.display.jpeg).subarray(0, 2).toString('hex')).toBe('ffd8');
  }, 90_000);

  it('passes a refusal on, and goes on reading after it', async () => {
    await expect(reader.read(Buffer.from('no picture'), OPTIONS)).rejects.toBeInstanceOf(TraceRefusal);
    const second = await reader.read(PHOTO, OPTIONS);
    expect(second.trace.method).toBe('markers');
  }, 90_000);

  it('stops when told, and reads the next one in a new process', async () => {
    const controller = new AbortController();
    const stopped = reader.read(PHOTO, OPTIONS, {
      onStage: (stage) => stage === 'markers' && controller.abort(new Error('stopped by hand')),
      signal: controller.signal,
    });
    const next = reader.read(PHOTO, OPTIONS);
    await expect(stopped).rejects.toThrow('stopped by hand');
    expect((await next).trace.slots).toHaveLength(1);
  }, 90_000);

  it('gives up at the time limit', async () => {
    const hasty = new PhotoReader({ timeLimitMs: 50, photosPerProcess: 1 });
    await expect(hasty.read(PHOTO, OPTIONS)).rejects.toBeInstanceOf(PhotoReaderFailure);
    hasty.close();
  }, 30_000);
});
