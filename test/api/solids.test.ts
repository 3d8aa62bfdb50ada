import { randomUUID } from 'node:crypto';
import { writeSolids } from '@foldwright/server/services/write-solids';
import type { Commerce } from '../support/commerce';
import { releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';

// The solid modeller starts in a process of its own.
jest.setTimeout(120_000);

describe('solids of a revision', () => {
  let shop: Commerce;
  let workshopId: string;
  let owner: TestBrowser;
  let revisionId: string;

  const stepFile = (browser: TestBrowser, stock = 'production') =>
    browser.get(`/api/revisions/${revisionId}/files/step?stock=${stock}`);
  const listed = async () => (await owner.get(`/api/revisions/${revisionId}`).expect(200)).body.files;

  beforeAll(async () => {
    shop = await startCommerce({});
    workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    const imogen = await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' });
    owner = await new TestBrowser(shop.app).signIn(imogen);
    ({ revisionId } = await releaseBracket(owner));
  });
  afterAll(() => shop.closeAll());

  it('are asked for in the transaction of the release, and are not there before', async () => {
    const waiting = await asOwner(shop.ownerUrl, async (client) => {
      const { rows } = await client.query<{ data: unknown }>("SELECT data FROM pgboss.job WHERE name = 'solid'");
      return rows;
    });
    expect(waiting).toEqual([{ data: { workshopId, revisionId } }]);
    expect((await listed()).map(({ kind }: { kind: string }) => kind)).not.toContain('step');
    await stepFile(owner).expect(404);
  });

  it('are written once for both sheets, whoever does the work again, and are the same bytes every time', async () => {
    const work = () => writeSolids(shop.database, shop.files, { workshopId, revisionId });
    await Promise.all([work(), work()]);
    const first = await stepFile(owner).responseType('blob').expect(200);
    await work();
    expect(await listed()).toContainEqual({ kind: 'step', fileName: expect.stringMatching(/ A .*production\.step$/) });
    const trial = await stepFile(owner, 'trial').responseType('blob').expect(200);
    expect(first.headers['content-type']).toContain('model/step');
    expect(first.headers['content-disposition']).toContain('attachment');
    const text = String(first.body);
    expect(text).toMatch(/^ISO-10303-21;/);
    expect(text).toContain('MANIFOLD_SOLID_BREP');
    expect(text).toContain('.MILLI.');
    expect(String(trial.body)).not.toBe(text);
    const rows = await asOwner(shop.ownerUrl, async (client) => {
      const answer = await client.query("SELECT stock FROM revision_files WHERE kind = 'step' ORDER BY stock");
      return answer.rows;
    });
    expect(rows).toEqual([{ stock: 'production' }, { stock: 'trial' }]);
  });

  it('are kept from other workshops', async () => {
    const other = await addWorkshop(shop.ownerUrl, `Other ${randomUUID().slice(0, 8)}`);
    const stranger = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Odd Stranger', { [other]: 'owner' }),
    );
    await stepFile(stranger).expect(404);
  });
});
