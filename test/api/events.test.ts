import { randomUUID } from 'node:crypto';
import express from 'express';
import { recordEvent } from '@foldwright/server/events/record-event';
import { openLiveHub } from '@foldwright/server/events/live-hub';
import { mayHear, streamEvents } from '@foldwright/server/events/stream-events';
import type { Listening } from '../support/event-stream';
import { EventStream, listenTo } from '../support/event-stream';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';
import { until } from '../support/until';

describe('live events', () => {
  let test: TestApp;
  let site: Listening;
  let workshop: string;
  let other: string;
  let owner: TestBrowser;
  let viewer: TestBrowser;
  let customer: TestBrowser;
  let stranger: TestBrowser;
  const streams: EventStream[] = [];

  beforeAll(async () => {
    test = await startTestApp();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    other = await addWorkshop(test.ownerUrl, 'Orchard Street Welding');
    const signIn = async (name: string, at: string, role: 'owner' | 'viewer' | 'customer') =>
      new TestBrowser(test.app).signIn(await addPerson(test.ownerUrl, name, { [at]: role }));
    owner = await signIn('Imogen Harrow', workshop, 'owner');
    viewer = await signIn('Ada Quill', workshop, 'viewer');
    customer = await signIn('Ravi Sandle', workshop, 'customer');
    stranger = await signIn('Petra Lowe', other, 'owner');
    site = await listenTo(test.app);
  });
  afterAll(async () => {
    streams.forEach((stream) => stream.close());
    await site.stop();
    await test.close();
  });

  const open = async (browser: TestBrowser, lastEventId?: number): Promise<EventStream> => {
    const stream = await EventStream.open(site.url, {
      cookie: browser.cookie,
      ...(lastEventId === undefined ? {} : { lastEventId }),
    });
    streams.push(stream);
    return stream;
  };
  const createPart = (name: string) =>
    owner
      .post('/api/parts')
      .set('idempotency-key', randomUUID())
      .send({ name, starter: { shape: 'flat-plate', widthMm: 80, heightMm: 60 } })
      .expect(201);
  /** An event as any process of the installation would record it. */
  const record = (workshopId: string, orderId: string = randomUUID()) =>
    test.database.inWorkshop(workshopId, async (scope) => recordEvent(scope, { kind: 'order-changed', orderId }));

  it('tells a page of its own workshop, and nobody else', async () => {
    const [here, there, buyer] = [await open(viewer), await open(stranger), await open(customer)];
    const created = await createPart('Pump tray');
    const [event] = await here.waitFor(1);
    expect(event).toMatchObject({ kind: 'part-changed', partId: created.body.id });
    await record(other);
    await there.waitFor(1);
    expect(there.events).toMatchObject([{ kind: 'order-changed' }]);
    expect(buyer.events).toEqual([]);
  });

  it('names draft, revision and the tab that sent the commands', async () => {
    const created = await createPart('Commanded');
    const stream = await open(viewer);
    await owner
      .post(`/api/drafts/${created.body.draft.id}/commands`)
      .send({
        baseRevision: 0,
        batchId: randomUUID(),
        clientId: 'tab-7',
        commands: [{ kind: 'setBaseAnchor', to: { x: 10, y: 10 } }],
      })
      .expect(200);
    await stream.waitFor(1);
    expect(stream.events[0]).toMatchObject({
      kind: 'draft-changed',
      draftId: created.body.draft.id,
      revision: 1,
      clientId: 'tab-7',
      by: 'Imogen Harrow',
    });
  });

  it('goes on after the last event a page has seen, in order and without gaps', async () => {
    const first = await open(viewer);
    await record(workshop);
    await first.waitFor(1);
    const seen = first.events[0]?.seq ?? 0;
    first.close();
    const missed = Array.from({ length: 30 }, () => randomUUID());
    await Promise.all(missed.map((orderId) => record(workshop, orderId)));
    const second = await open(viewer, seen);
    const during = Array.from({ length: 10 }, () => randomUUID());
    await Promise.all(during.map((orderId) => record(workshop, orderId)));
    await second.waitFor(40);
    const heard = second.events.map((event) => (event.kind === 'order-changed' ? event.orderId : ''));
    expect(new Set(heard)).toEqual(new Set([...missed, ...during]));
    expect(heard).toHaveLength(40);
    const numbers = second.events.map(({ seq }) => seq);
    expect(numbers).toEqual([...numbers].sort((a, b) => a - b));
  });

  it('begins with now when a page has seen nothing, or comes with a number from the future', async () => {
    await record(workshop);
    for (const lastEventId of [undefined, 900_000_000]) {
      const stream = await open(viewer, lastEventId);
      const orderId = randomUUID();
      await record(workshop, orderId);
      await stream.waitFor(1);
      expect(stream.events).toMatchObject([{ orderId }]);
    }
  });

  it('works across web processes and outlives a lost connection to the database', async () => {
    const hubErrors: string[] = [];
    const hub = await openLiveHub({ url: test.applicationUrl, onError: (error) => hubErrors.push(error.message) });
    let woken = 0;
    const unsubscribe = hub.subscribe(workshop, () => (woken += 1));
    await record(workshop);
    await until(async () => (woken > 0 ? true : undefined));
    await asOwner(test.ownerUrl, (client) =>
      client.query(
        "SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE application_name = 'foldwright-listen' AND datname = current_database()",
      ),
    );
    await until(async () => (hubErrors.length > 0 ? true : undefined));
    const before = woken;
    // What was said while nobody listened is looked up at the new connection.
    await until(async () => (woken > before ? true : undefined));
    unsubscribe();
    await hub.stop();
    test.loggedErrors.splice(0);
  });

  it('is for people who are signed in', async () => {
    const stream = await EventStream.open(site.url, { cookie: '' });
    expect(stream.status).toBe(401);
  });

  it('ends with its session', async () => {
    const app = express();
    let isAdmitted = true;
    app.get('/stream', (request, response) =>
      streamEvents(request, response, {
        database: test.database,
        hub: { subscribe: () => () => undefined, stop: async () => undefined },
        listener: { workshopId: workshop, role: 'viewer' },
        stillAdmitted: async () => isAdmitted,
        onError: (error) => test.loggedErrors.push(String(error)),
        heartbeatMs: 30,
      }),
    );
    const short = await listenTo(app);
    const stream = await EventStream.open(short.url, { cookie: '' }, '/stream');
    await until(async () => ((stream.text.match(/: here/g)?.length ?? 0) > 2 ? true : undefined));
    expect(stream.hasEnded).toBe(false);
    isAdmitted = false;
    await until(async () => (stream.hasEnded ? true : undefined));
    await short.stop();
    expect(test.loggedErrors).toEqual([]);
  });

  it('keeps mail from viewers and everything from customers', () => {
    const mail = { kind: 'mail-changed', seq: 1, mailId: randomUUID() } as const;
    const part = { kind: 'part-changed', seq: 1, partId: randomUUID() } as const;
    expect(
      (['owner', 'fabricator', 'viewer', 'customer', 'operator'] as const).map((role) => mayHear(role, mail)),
    ).toEqual([true, true, false, false, false]);
    expect(mayHear('viewer', part)).toBe(true);
    expect(mayHear('customer', part)).toBe(false);
  });
});
