import { randomUUID } from 'node:crypto';
import { partSummarySchema } from '@foldwright/shared/contracts/parts';
import { customerOrderSchema } from '@foldwright/shared/contracts/sale-links';
import { offerSchema, shopListingSchema } from '@foldwright/shared/contracts/storefront';
import { seedDemo } from '@foldwright/server/database/seed-demo';
import people from '@foldwright/server/setup/demo/people.json';
import { TestBrowser, addWorkshop, asOwner } from '../support/people';
import { ADDRESS } from '../support/shop';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

describe('the demo', () => {
  let test: TestApp;
  const seed = () =>
    seedDemo({ ownerUrl: test.ownerUrl, database: test.database, files: test.files, now: () => new Date() });

  beforeEach(async () => {
    test = await startTestApp();
  });
  afterEach(() => test.close());

  const partNumbers = async (): Promise<string[]> => {
    const { rows } = await asOwner(test.ownerUrl, (client) => client.query('SELECT number FROM parts ORDER BY number'));
    return rows.map(({ number }) => String(number));
  };

  it('is put in once, also by two programs at once, and everybody in it can sign in', async () => {
    const runs = await Promise.all([seed(), seed()]);
    expect(runs.sort()).toEqual([false, true]);
    expect(await seed()).toBe(false);
    expect(await partNumbers()).toEqual(['LC-02', 'LC-03', 'LC-04', 'LC-07', 'LC-11', 'OS-01']);

    for (const { email, password, name, role } of people.people) {
      const browser = await new TestBrowser(test.app).open();
      const { body } = await browser.post('/api/session').send({ email, password }).expect(200);
      expect(body.user).toMatchObject({ name, isOperator: role === 'operator' });
      expect(body.current?.role ?? 'operator').toBe(role);
    }
    const owner = await new TestBrowser(test.app).open();
    await owner.post('/api/session').send({ email: 'imogen@larkfield.example.test', password: 'kettle-brass-seven' });
    const list = await owner.get('/api/parts').expect(200);
    const parts = list.body.parts.map((part: unknown) => partSummarySchema.parse(part));
    const states = new Map(parts.map((part: { number: string; state: string }) => [part.number, part.state]));
    expect(Object.fromEntries(states)).toMatchObject({ 'LC-02': 'alloy', 'LC-07': 'blued', 'LC-11': 'blued' });
    const revisionId = parts.find((part: { number: string }) => part.number === 'LC-02')?.latestRevision?.id;
    const file = await owner.get(`/api/revisions/${revisionId}/files/dxf?stock=production`).buffer(true).expect(200);
    expect(file.headers['content-disposition']).toMatch(/^attachment; filename="LC-02 A Pump tray production.dxf"/);
    const detail = await owner.get(`/api/revisions/${revisionId}`).expect(200);
    expect(detail.body.files).toHaveLength(4);
  });

  it('has a shop whose water kit lacks one bracket in moss, and can be sent at once in cream', async () => {
    await seed();
    await seed();
    const guest = await new TestBrowser(test.app).open();
    const { body } = await guest.get('/api/shops/larkfield/listings').expect(200);
    expect(body.cards.map(({ title, kind }: { title: string; kind: string }) => [kind, title])).toEqual([
      ['kit', 'Two-pump water kit'],
      ['bracket', 'Battery strap anchor'],
      ['bracket', 'Regulator bracket'],
    ]);
    const kit = shopListingSchema.parse(
      (await guest.get('/api/shops/larkfield/listings/two-pump-water-kit').expect(200)).body,
    );
    expect(kit.pieces.filter(({ kind }) => kind === 'bracket')).toHaveLength(3);
    const onShelf = Object.fromEntries(kit.availability.map((row) => [row.finishId, row.onShelf]));
    expect(onShelf).toMatchObject({ 'powder-moss': 0, 'powder-cream': 2 });
    const lines = [{ listingId: kit.id, finishId: 'powder-moss', quantity: 1 }];
    const offer = await guest.post('/api/shops/larkfield/offers').send({ lines }).expect(200);
    const { offerHash } = offerSchema.parse(offer.body);
    const { body: sale } = await guest
      .post('/api/shops/larkfield/sales')
      .set('idempotency-key', randomUUID())
      .send({ lines, offerHash, email: 'ravi@example.test', address: ADDRESS })
      .expect(201);
    const order = customerOrderSchema.parse((await guest.get(`/api/sale-links/${sale.link}`).expect(200)).body);
    const short = order.items.filter((item) => item.short > 0);
    expect(short).toMatchObject([{ short: 1, what: { partName: 'Regulator bracket', finishId: 'powder-moss' } }]);
  });

  it('is taken up again where a run was broken off', async () => {
    await expect(
      seedDemo({
        ownerUrl: test.ownerUrl,
        database: test.database,
        files: { ...test.files, put: () => Promise.reject(new Error('the disk is full')) },
        now: () => new Date(),
      }),
    ).rejects.toThrow('the disk is full');
    expect(await partNumbers()).toEqual(['LC-02']);
    expect(await seed()).toBe(true);
    expect(await partNumbers()).toHaveLength(6);
    const { rows } = await asOwner(test.ownerUrl, (client) => client.query('SELECT COUNT(*)::int AS n FROM revisions'));
    expect(rows).toEqual([{ n: 3 }]);
  });

  it('stays out of an installation that has a workshop of its own', async () => {
    await addWorkshop(test.ownerUrl, 'A real one');
    expect(await seed()).toBe(false);
    expect(await partNumbers()).toEqual([]);
  });
});
