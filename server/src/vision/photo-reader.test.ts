import { PhotoReader } from './photo-reader';
import { TraceRefusal } from './trace-refusal';

jest.setTimeout(60_000);

describe('PhotoReader', () => {
  let reader: PhotoReader;
  beforeEach(() => {
    reader = new PhotoReader();
  });
  afterEach(() => reader.close());

  it('reads one after the other in one process and leaves no listener behind', async () => {
    const warnings: string[] = [];
    const note = (warning: Error): unknown => warnings.push(warning.message);
    process.on('warning', note);
    try {
      for (let photo = 0; photo < 12; photo += 1) {
        await expect(reader.read(Buffer.from(`no picture ${photo}`), { thicknessMm: 1 })).rejects.toThrow(TraceRefusal);
      }
      // Node tells of too many listeners a turn later.
      await new Promise((resolve) => setImmediate(resolve));
    } finally {
      process.off('warning', note);
    }
    expect(warnings).toEqual([]);
  });

  it('stops when it is told to and reads the next photo all the same', async () => {
    const stop = new AbortController();
    const reading = reader.read(Buffer.alloc(5_000_000), { thicknessMm: 1 }, { signal: stop.signal });
    stop.abort(new Error('stopped by a person'));
    await expect(reading).rejects.toThrow('stopped by a person');
    await expect(reader.read(Buffer.from('no picture'), { thicknessMm: 1 })).rejects.toThrow(TraceRefusal);
  });
});
