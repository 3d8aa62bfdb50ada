import type * as childProcess from 'node:child_process';
import { PhotoReader } from './photo-reader';
import { TraceRefusal } from './trace-refusal';

jest.setTimeout(60_000);

/** The processes that were really started, to look at from outside. */
const forked: childProcess.ChildProcess[] = [];
jest.mock('node:child_process', () => {
  const actual = jest.requireActual<typeof childProcess>('node:child_process');
  return {
    ...actual,
    fork: (...given: Parameters<typeof actual.fork>) => {
      const child = actual.fork(...given);
      forked.push(child);
      return child;
    },
  };
});

describe('PhotoReader', () => {
  let reader: PhotoReader;
  beforeEach(() => {
    forked.length = 0;
    reader = new PhotoReader();
  });
  afterEach(() => reader.close());

  it('reads one after the other in one process and leaves no listener behind', async () => {
    for (let photo = 0; photo < 3; photo += 1) {
      await expect(reader.read(Buffer.from(`no picture ${photo}`), { thicknessMm: 1 })).rejects.toThrow(TraceRefusal);
    }
    expect(forked).toHaveLength(1);
    expect(['message', 'exit', 'error'].map((event) => forked[0]?.listenerCount(event))).toEqual([0, 0, 1]);
  });

  it('stops when it is told to and reads the next photo all the same', async () => {
    const stop = new AbortController();
    const reading = reader.read(Buffer.alloc(5_000_000), { thicknessMm: 1 }, { signal: stop.signal });
    stop.abort(new Error('stopped by a person'));
    await expect(reading).rejects.toThrow('stopped by a person');
    await expect(reader.read(Buffer.from('no picture'), { thicknessMm: 1 })).rejects.toThrow(TraceRefusal);
  });
});
