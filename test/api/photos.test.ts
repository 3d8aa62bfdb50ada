import { randomUUID } from 'node:crypto';
import { readFile, readdir } from 'node:fs/promises';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { connect } from 'node:net';
import path from 'node:path';
import type { Job, Photo } from '@foldwright/shared/contracts/photos';
import { jobSchema, photoSchema } from '@foldwright/shared/contracts/photos';
import pino from 'pino';
import sharp from 'sharp';
import * as z from 'zod/mini';
import type { RunningWorker } from '@foldwright/server/jobs/run-worker';
import { openQueue } from '@foldwright/server/jobs/queue';
import { runWorker } from '@foldwright/server/jobs/run-worker';
import type { ReadsPhotos } from '@foldwright/server/jobs/photo-reader-port';
import { traceHandler } from '@foldwright/server/jobs/trace-photo';
import { visionReader } from '@foldwright/server/jobs/vision-reader';
import { TraceRefusal } from '@foldwright/server/vision/trace-refusal';
import { plainJpeg } from '../support/jpeg';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import { SQUARE_TRACE, ScriptedReader } from '../support/scripted-reader';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';
import { until } from '../support/until';

const truthSchema = z.object({ holes: z.array(z.unknown()), thicknessMm: z.number() });
const PHOTOS = path.resolve(__dirname, '../fixtures/photos');
const FACTS = { templateKind: 'single-wall', templateThicknessMm: '3', rulerXMm: '100', rulerYMm: '99.5' };

describe('photos of templates', () => {
  let test: TestApp;
  let browser: TestBrowser;
  let workshop: string;
  let worker: RunningWorker | undefined;

  beforeAll(async () => {
    test = await startTestApp();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    const tomasz = await addPerson(test.ownerUrl, 'Tomasz Wren', { [workshop]: 'fabricator' });
    browser = await new TestBrowser(test.app).signIn(tomasz);
  });
  afterAll(() => test.close());
  afterEach(async () => {
    await worker?.stop();
    worker = undefined;
    expect(test.loggedErrors.splice(0)).toEqual([]);
  });

  const newPart = async (): Promise<string> => {
    const { body } = await browser
      .post('/api/parts')
      .set('idempotency-key', randomUUID())
      .send({ name: 'Umbrella foot', starter: null })
      .expect(201);
    return body.id;
  };
  const upload = (partId: string, file: Buffer, name = 'template.jpg', facts: Record<string, string> = FACTS) => {
    const request = browser.post(`/api/parts/${partId}/photos`);
    for (const [field, value] of Object.entries(facts)) request.field(field, value);
    return request.attach('file', file, name);
  };
  const uploaded = async (file?: Buffer): Promise<Photo> => {
    const answer = await upload(await newPart(), file ?? (await plainJpeg())).expect(202);
    return photoSchema.parse(answer.body);
  };
  const startWorker = async (reader: ReadsPhotos): Promise<void> => {
    const { database, files } = test;
    const queue = await openQueue({
      pool: database.pool,
      isWorker: true,
      onError: (error) => test.loggedErrors.push(error.message),
    });
    const logger = pino({ level: 'silent' });
    const handlers = [traceHandler({ database, files, reader, logger, now: () => new Date() })];
    worker = await runWorker({ database, queue, handlers, logger });
  };
  const readPhoto = async (photoId: string): Promise<Photo> =>
    photoSchema.parse((await browser.get(`/api/photos/${photoId}`).expect(200)).body);
  // The real reader starts a process of its own, which takes its time where many tests run at once.
  const jobIn = (photoId: string, ...states: Job['state'][]): Promise<Photo> =>
    until(async () => {
      const photo = await readPhoto(photoId);
      return photo.job !== null && states.includes(photo.job.state) ? photo : undefined;
    }, 40_000);
  const storedFiles = async (): Promise<string[]> => {
    const names = await readdir(test.filesDirectory, { recursive: true, withFileTypes: true });
    return names.filter((entry) => entry.isFile()).map((entry) => path.join(entry.parentPath, entry.name));
  };

  describe('hostile uploads', () => {
    let partId: string;
    let before: string[];

    beforeAll(async () => {
      partId = await newPart();
    });
    beforeEach(async () => {
      before = await storedFiles();
    });
    afterEach(async () => {
      // Whatever was refused leaves nothing behind, on disk or in the queue.
      expect(await until(async () => ((await storedFiles()).length === before.length ? before : undefined))).toBe(
        before,
      );
    });

    it('refuses what only calls itself a picture', async () => {
      for (const bytes of [
        Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>'),
        Buffer.from('GIF89a\x01\x00\x01\x00\x00\x00\x00;'),
        Buffer.from('%PDF-1.7'),
        Buffer.alloc(0),
      ]) {
        const { body } = await upload(partId, bytes, 'photo.jpg').expect(415);
        expect(body.type).toBe('/problems/file-type-not-taken');
      }
    });

    it('refuses a picture that ends in its middle', async () => {
      const whole = await sharp({
        create: {
          width: 900,
          height: 700,
          channels: 3,
          background: '#000',
          noise: { type: 'gaussian', mean: 128, sigma: 40 },
        },
      })
        .jpeg()
        .toBuffer();
      const { body } = await upload(partId, whole.subarray(0, Math.floor(whole.length / 2))).expect(422);
      expect(body).toMatchObject({
        type: '/problems/photo-refused',
        kept: expect.stringContaining('Nothing was stored'),
      });
    });

    it('refuses a small file that holds a huge picture by its header alone', async () => {
      const huge = await plainPng(60_000, 60_000);
      expect(huge.length).toBeLessThan(2000);
      const began = performance.now();
      const { body } = await upload(partId, huge, 'tiny.png').expect(413);
      expect(body.detail).toMatch(/3600 megapixels/);
      expect(performance.now() - began).toBeLessThan(2000);
    });

    it('refuses a file above 25 MB', async () => {
      const { body } = await upload(partId, Buffer.alloc(25 * 1024 * 1024 + 1, 0xff)).expect(413);
      expect(body.type).toBe('/problems/file-too-large');
    });

    it('lists every fact that is wrong, and a missing file', async () => {
      const { body } = await upload(partId, await plainJpeg(), 'a.jpg', {
        templateKind: 'paper',
        templateThicknessMm: 'thick',
        rulerXMm: '50',
        colour: 'blue',
      }).expect(400);
      expect(body.errors.map((error: { pointer: string }) => error.pointer).sort()).toEqual([
        '/colour',
        '/rulerXMm',
        '/rulerYMm',
        '/templateKind',
        '/templateThicknessMm',
      ]);
      const bare = await browser.post(`/api/parts/${partId}/photos`).field('templateKind', 'card').expect(400);
      expect(bare.body.errors).toEqual([{ pointer: '/file', detail: 'This is missing.' }]);
      await browser.post(`/api/parts/${partId}/photos`).send({ templateKind: 'card' }).expect(400);
    });

    it('clears away an upload whose sender hung up', async () => {
      const server = createServer(test.app).listen(0, '127.0.0.1');
      await new Promise((resolve) => server.once('listening', resolve));
      // `address()` is a string only for sockets in the file system.
      const { port } = server.address() as AddressInfo;
      const boundary = 'cut';
      const head = [
        `POST /api/parts/${partId}/photos HTTP/1.1`,
        'Host: 127.0.0.1',
        `Cookie: ${browser.cookie}`,
        `x-csrf-token: ${browser.csrfToken}`,
        `Content-Type: multipart/form-data; boundary=${boundary}`,
        'Content-Length: 1000000',
        '',
        `--${boundary}`,
        'Content-Disposition: form-data; name="file"; filename="a.jpg"',
        '',
        '\xff\xd8\xff half a photo',
      ].join('\r\n');
      const socket = connect(port, '127.0.0.1', () => socket.write(head, 'latin1'));
      await until(async () => ((await storedFiles()).length > before.length ? true : undefined));
      socket.destroy();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    });
  });

  it('keeps a photo with its facts, upright and without what the camera wrote into it', async () => {
    const turned = await sharp({ create: { width: 400, height: 300, channels: 3, background: '#335577' } })
      .withExif({ IFD0: { Copyright: 'somebody', Make: 'a camera' }, IFD3: { GPSLatitude: '52/1 31/1 0/1' } })
      .withMetadata({ orientation: 6 })
      .jpeg()
      .toBuffer();
    const photo = await uploaded(turned);
    expect(photo).toMatchObject({
      widthPx: 300,
      heightPx: 400,
      templateKind: 'single-wall',
      trace: null,
      rectified: null,
    });
    expect(photo.job).toMatchObject({ state: 'waiting', attempt: 0, failure: null });
    const image = await browser.get(`/api/photos/${photo.id}/image?view=as-taken`).expect(200);
    expect(image.headers['content-security-policy']).toContain("default-src 'none'");
    const metadata = await sharp(image.body).metadata();
    expect(metadata).toMatchObject({ width: 300, height: 400, format: 'jpeg' });
    expect(metadata.exif).toBeUndefined();
    expect(metadata.orientation).toBeUndefined();
    await browser.get(`/api/photos/${photo.id}/image?view=rectified`).expect(404);
  });

  it('reads a photo in the worker, stage by stage', async () => {
    const reader = new ScriptedReader();
    await startWorker(reader);
    const began = performance.now();
    const photo = await uploaded();
    const read = await jobIn(photo.id, 'done');
    expect(performance.now() - began).toBeLessThan(3000);
    expect(read.trace).toEqual(SQUARE_TRACE);
    expect(read.rectified).toEqual({ pixelsPerMm: 4, widthMm: 210, heightMm: 297 });
    expect(read.job?.stages).toMatchObject([
      { stage: 'decode', state: 'done' },
      { stage: 'markers', state: 'done', note: '20 markers' },
      { stage: 'square-up', state: 'done', note: 'tilted by 12°' },
      { stage: 'template', state: 'done' },
      { stage: 'outline', state: 'done', note: '4 lines and arcs, ± 0.14 mm' },
      { stage: 'holes', state: 'done', note: '1 opening' },
    ]);
    expect(reader.seen.at(-1)).toEqual({
      templateKind: 'single-wall',
      templateThicknessMm: 3,
      printScaleX: 1,
      printScaleY: 0.995,
    });
    await browser.get(`/api/photos/${photo.id}/image?view=rectified`).expect(200);
    const list = await browser.get('/api/parts').expect(200);
    expect(list.body.parts.find((part: { id: string }) => part.id === photo.partId).openQuestion).toBe(
      'The trace waits to be accepted',
    );
  });

  it('says in words why a photo can’t be measured, and runs it again when asked', async () => {
    let isDark = true;
    const reader = new ScriptedReader(async (stage) => {
      if (stage === 'markers' && isDark) throw new TraceRefusal('tooDark', 'too dark');
    });
    await startWorker(reader);
    const photo = await uploaded();
    const failed = await jobIn(photo.id, 'failed');
    expect(failed.job?.failure).toMatchObject({ code: 'tooDark', kept: expect.stringContaining('kept') });
    expect(failed.job?.failure?.next).not.toBe('');
    isDark = false;
    const retried = await browser.post(`/api/jobs/${failed.job?.id}/retry`).expect(202);
    expect(jobSchema.parse(retried.body)).toMatchObject({ state: 'waiting', failure: null });
    await jobIn(photo.id, 'done');
    await browser.post(`/api/jobs/${failed.job?.id}/retry`).expect(409);
  });

  it('tries a reading that breaks on our side three times, then says so', async () => {
    const reader = new ScriptedReader(async () => {
      throw new Error('a fault of ours');
    });
    await startWorker(reader);
    const photo = await uploaded();
    const failed = await jobIn(photo.id, 'failed');
    expect(failed.job).toMatchObject({ attempt: 3, failure: { code: 'internal' } });
    expect(reader.seen).toHaveLength(3);
  });

  it('stops a reading that waits, and one that runs', async () => {
    const waiting = await uploaded();
    await browser.delete(`/api/jobs/${waiting.job?.id}`).expect(200);
    let running: (() => void) | undefined;
    const isRunning = new Promise<void>((resolve) => (running = resolve));
    let ended: unknown;
    const reader = new ScriptedReader(async (stage, signal) => {
      if (stage === 'square-up') running?.();
      await new Promise((resolve) => setTimeout(resolve, stage === 'square-up' ? 300 : 20));
      if (signal.aborted) ended = signal.reason;
    });
    await startWorker(reader);
    const photo = await uploaded();
    await isRunning;
    const stopped = await browser.delete(`/api/jobs/${photo.job?.id}`).expect(200);
    expect(stopped.body.state).toBe('stopped');
    await until(async () => (ended === undefined ? undefined : true));
    const after = await readPhoto(photo.id);
    expect(after).toMatchObject({ trace: null, job: { state: 'stopped' } });
    expect((await readPhoto(waiting.id)).job?.state).toBe('stopped');
    expect(reader.seen).toHaveLength(1);
    await browser.delete(`/api/jobs/${photo.job?.id}`).expect(409);
  });

  it('reads a photo again with other facts, one reading at a time', async () => {
    await startWorker(new ScriptedReader());
    const photo = await uploaded();
    await jobIn(photo.id, 'done');
    const again = () =>
      browser.post(`/api/photos/${photo.id}/reading`).send({ templateKind: 'board', templateThicknessMm: 2 });
    await worker?.stop();
    worker = undefined;
    const answer = await again().expect(202);
    expect(answer.body).toMatchObject({ templateKind: 'board', job: { state: 'waiting' }, trace: { markersUsed: 20 } });
    await again().expect(409);
    const reader = new ScriptedReader();
    await startWorker(reader);
    await jobIn(photo.id, 'done');
    expect(reader.seen).toMatchObject([{ templateKind: 'board', templateThicknessMm: 2 }]);
    const { rows } = await asOwner(test.ownerUrl, (client) =>
      client.query('SELECT rectified_stored_as FROM photos WHERE id = $1', [photo.id]),
    );
    const ofPhoto = (await storedFiles()).filter((file) => file.endsWith(rows[0].rectified_stored_as));
    expect(ofPhoto).toHaveLength(1);
  });

  it('reads a real photo with the real reader', async () => {
    const reader = visionReader();
    await startWorker(reader);
    const text = await readFile(path.join(PHOTOS, '02-regulator-bracket-steel.truth.json'), 'utf8');
    const truth = truthSchema.parse(JSON.parse(text));
    const bytes = await readFile(path.join(PHOTOS, '02-regulator-bracket-steel.jpg'));
    const facts = { ...FACTS, rulerYMm: '100', templateThicknessMm: String(truth.thicknessMm) };
    const photo = photoSchema.parse((await upload(await newPart(), bytes, 'bracket.jpg', facts).expect(202)).body);
    const read = await jobIn(photo.id, 'done', 'failed');
    reader.close();
    expect(read.job).toMatchObject({ state: 'done', failure: null, attempt: 1 });
    expect(read.trace?.holes).toHaveLength(truth.holes.length);
    expect(read.trace?.uncertaintyMm).toBeLessThan(1);
    const image = await browser.get(`/api/photos/${photo.id}/image?view=rectified`).expect(200);
    const { width, height } = await sharp(image.body).metadata();
    const { pixelsPerMm, widthMm, heightMm } = read.rectified ?? { pixelsPerMm: 0, widthMm: 0, heightMm: 0 };
    expect(width / pixelsPerMm).toBeCloseTo(widthMm, 0);
    expect(height / pixelsPerMm).toBeCloseTo(heightMm, 0);
  });

  it('takes no photo for a part without a draft', async () => {
    const created = await browser
      .post('/api/parts')
      .set('idempotency-key', randomUUID())
      .send({ name: 'Plate', starter: { shape: 'flat-plate', widthMm: 80, heightMm: 60 } })
      .expect(201);
    await browser
      .post(`/api/drafts/${created.body.draft.id}/release`)
      .set('idempotency-key', randomUUID())
      .send({ baseRevision: 0, note: '', acceptedCautionIds: [] })
      .expect(201);
    const { body } = await upload(created.body.id, await plainJpeg()).expect(409);
    expect(body).toMatchObject({
      type: '/problems/wrong-state',
      next: expect.stringContaining('Start the next draft'),
    });
  });
});

/** A PNG whose header claims a size; its data is a few bytes that would unpack to far more. */
async function plainPng(widthPx: number, heightPx: number): Promise<Buffer> {
  const png = await sharp({ create: { width: 8, height: 8, channels: 3, background: '#fff' } })
    .png()
    .toBuffer();
  const header = Buffer.from(png);
  header.writeUInt32BE(widthPx, 16);
  header.writeUInt32BE(heightPx, 20);
  header.writeUInt32BE(crc32(header.subarray(12, 29)), 29);
  return header;
}

/** CRC of PNG chunks. Source: ISO/IEC 15948, annex D. */
function crc32(bytes: Buffer): number {
  let crc = 0xffffffff;
  for (const byte of bytes) {
    crc ^= byte;
    for (let bit = 0; bit < 8; bit += 1) crc = crc & 1 ? (crc >>> 1) ^ 0xedb88320 : crc >>> 1;
  }
  return (crc ^ 0xffffffff) >>> 0;
}
