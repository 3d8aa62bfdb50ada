import type { ChildProcess } from 'node:child_process';
import { spawn } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { readdir } from 'node:fs/promises';
import path from 'node:path';
import type { Photo } from '@foldwright/shared/contracts/photos';
import { photoSchema } from '@foldwright/shared/contracts/photos';
import { plainJpeg } from '../support/jpeg';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { TEST_SESSION_SECRET, startTestApp } from '../support/test-app';
import { until } from '../support/until';

const ROOT = path.resolve(__dirname, '../..');
const NOBODY = 'http://127.0.0.1:1';

describe('a worker that is killed', () => {
  let test: TestApp;
  let browser: TestBrowser;
  let workshop: string;
  const workers: ChildProcess[] = [];

  beforeAll(async () => {
    test = await startTestApp();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    browser = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Tomasz Wren', { [workshop]: 'fabricator' }),
    );
  });
  afterAll(async () => {
    for (const worker of workers) worker.kill('SIGKILL');
    await test.close();
  });

  /** A worker process of its own; with a stage it never gets past that one. */
  const startWorker = async (holdsAt?: string): Promise<ChildProcess> => {
    const worker = spawn(
      process.execPath,
      ['--require', 'tsx/cjs', 'test/support/slow-worker.ts', ...(holdsAt === undefined ? [] : [holdsAt])],
      {
        cwd: ROOT,
        stdio: ['ignore', 'pipe', 'inherit'],
        env: {
          PATH: process.env['PATH'],
          TSX_TSCONFIG_PATH: path.join(ROOT, 'test/tsconfig.json'),
          DATABASE_URL: test.applicationUrl,
          FILES_DIR: test.filesDirectory,
          SESSION_SECRET: TEST_SESSION_SECRET,
          PAYMENT_API_KEY: 'sk_test',
          PAYMENT_HOST_URL: NOBODY,
          PAYMENT_WEBHOOK_SECRET: 'secret',
          CUTTING_SERVICE_URL: NOBODY,
          CUTTING_SERVICE_KEY: 'key',
          CUTTING_SERVICE_CALLBACK_SECRET: 'secret',
          SMTP_URL: 'smtp://127.0.0.1:1',
        },
      },
    );
    workers.push(worker);
    await once(worker.stdout, 'data');
    return worker;
  };

  const readPhoto = async (photoId: string): Promise<Photo> =>
    photoSchema.parse((await browser.get(`/api/photos/${photoId}`).expect(200)).body);

  it('in mid-trace: another takes the job within 15 s, and nothing is lost or doubled', async () => {
    const doomed = await startWorker('square-up');
    const created = await browser
      .post('/api/parts')
      .set('idempotency-key', randomUUID())
      .send({ name: 'Umbrella foot', starter: null })
      .expect(201);
    const facts = { templateKind: 'card', templateThicknessMm: '0.5', rulerXMm: '100', rulerYMm: '100' };
    const request = browser.post(`/api/parts/${created.body.id}/photos`);
    for (const [field, value] of Object.entries(facts)) request.field(field, value);
    const { body } = await request.attach('file', await plainJpeg(), 'template.jpg').expect(202);
    const photo = photoSchema.parse(body);

    await until(async () => {
      const { job } = await readPhoto(photo.id);
      const reached = job?.stages.find(({ stage }) => stage === 'square-up');
      return reached?.state === 'running' ? true : undefined;
    }, 30_000);
    const rescuer = await startWorker();
    const killedAt = performance.now();
    doomed.kill('SIGKILL');
    await once(doomed, 'exit');

    const read = await until(async () => {
      const found = await readPhoto(photo.id);
      return found.job?.state === 'done' ? found : undefined;
    }, 20_000);
    expect(performance.now() - killedAt).toBeLessThan(15_000);
    expect(read.job).toMatchObject({ id: photo.job?.id, attempt: 2, failure: null });
    expect(read.trace?.markersUsed).toBe(20);

    const counts = await asOwner(test.ownerUrl, (client) =>
      client.query(`SELECT (SELECT COUNT(*)::int FROM photos) AS photos, (SELECT COUNT(*)::int FROM jobs) AS jobs,
        (SELECT COUNT(*)::int FROM pgboss.job WHERE name = 'trace' AND state = 'completed') AS completed,
        (SELECT COUNT(*)::int FROM pgboss.job WHERE name = 'trace') AS enqueued,
        (SELECT COUNT(*)::int FROM work_in_hand) AS in_hand`),
    );
    expect(counts.rows).toEqual([{ photos: 1, jobs: 1, completed: 1, enqueued: 1, in_hand: 0 }]);
    // The original, the display picture and one rectified picture.
    expect(await readdir(path.join(test.filesDirectory, workshop))).toHaveLength(3);
    rescuer.kill('SIGKILL');
  });
});
