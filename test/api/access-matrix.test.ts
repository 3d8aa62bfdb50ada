import { randomUUID } from 'node:crypto';
import { ROUTE_CONTRACTS } from '@foldwright/shared/contracts/registry';
import type { Role, RouteContract } from '@foldwright/shared/contracts/route';
import { ROLES } from '@foldwright/shared/contracts/route';
import type request from 'supertest';
import { plainJpeg } from '../support/jpeg';
import type { Ids } from '../support/route-inputs';
import { BODIES, FIELDS, ID_NAMES, PLATE, QUERIES } from '../support/route-inputs';
import { ADDRESS, HARDWARE, KIT, LISTING, SETTINGS } from '../support/shop-inputs';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

/** Ids of one row of every kind that an address can name. */
const idempotencyKey = (): [string, string] => ['idempotency-key', randomUUID()];

describe('who may call what', () => {
  let test: TestApp;
  let workshop: string;
  let own: Ids;
  let missing: Ids;
  let jpeg: Buffer;
  /** One browser for each role in the workshop whose rows are asked for, and in another one. */
  const here = new Map<Role, TestBrowser>();
  const elsewhere = new Map<Role, TestBrowser>();

  beforeAll(async () => {
    test = await startTestApp();
    jpeg = await plainJpeg();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    const other = await addWorkshop(test.ownerUrl, 'Orchard Street Welding', 'OS');
    for (const role of ROLES) {
      for (const [browsers, at] of [
        [here, workshop],
        [elsewhere, other],
      ] as const) {
        const person =
          role === 'operator'
            ? await addPerson(test.ownerUrl, 'Mira Oakes', {}, { isOperator: true })
            : await addPerson(test.ownerUrl, `${role} person`, { [at]: role });
        browsers.set(role, await new TestBrowser(test.app).signIn(person));
      }
    }
    own = await fill(browserOf(here, 'owner'));
    missing = Object.fromEntries(ID_NAMES.map((name) => [name, randomUUID()])) as Ids;
  });
  afterAll(() => test.close());

  function browserOf(browsers: ReadonlyMap<Role, TestBrowser>, role: Role): TestBrowser {
    const browser = browsers.get(role);
    if (browser === undefined) throw new Error(`Nobody is signed in as ${role}.`);
    return browser;
  }

  /** One row of every kind, made through the API as far as it goes without outside services. */
  async function fill(owner: TestBrowser): Promise<Ids> {
    const create = async (name: string) =>
      (
        await owner
          .post('/api/parts')
          .set(...idempotencyKey())
          .send({ name, starter: PLATE })
          .expect(201)
      ).body;
    const released = await create('Released');
    const release = { baseRevision: 0, note: '', acceptedCautionIds: [] };
    const revision = await owner
      .post(`/api/drafts/${released.draft.id}/release`)
      .set(...idempotencyKey())
      .send(release)
      .expect(201);
    const part = await create('In draft');
    const photo = await owner
      .post(`/api/parts/${part.id}/photos`)
      .field({ templateKind: 'card', templateThicknessMm: '0.5', rulerXMm: '100', rulerYMm: '100' })
      .attach('file', jpeg, 'template.jpg')
      .expect(202);
    const revisionId = String(revision.body.id);
    const commerce = await addQuoteAndOrder(released.id, revisionId, String(revision.body.hash));
    return {
      partId: part.id,
      draftId: part.draft.id,
      photoId: photo.body.id,
      jobId: photo.body.job.id,
      revisionId,
      ...commerce,
      ...(await addShopRows(owner, revisionId)),
    };
  }

  /** Hardware, a kit, a place on the shelf, a listing, a sale with a parcel and a refund, and a question about fit. */
  async function addShopRows(owner: TestBrowser, revisionId: string) {
    const made = async (address: string, body: object): Promise<string> => {
      const answer = await owner
        .post(address)
        .set(...idempotencyKey())
        .send(body)
        .expect(201);
      return String(answer.body.id ?? answer.body.positionId);
    };
    const hardwareId = await made('/api/hardware', HARDWARE(randomUUID()));
    const kitId = await made('/api/kits', KIT(hardwareId));
    const what = { kind: 'bracket', revisionId, finishId: 'bare' };
    const positionId = await made('/api/stock/receipts', { what, quantity: 5, orderId: null, reason: '' });
    const listingId = await made('/api/shop/listings', LISTING(revisionId, 'matrix'));
    const settings = await owner.get('/api/shop/settings').expect(200);
    await owner.put('/api/shop/settings').set('if-match', `"${settings.body.revision}"`).send(SETTINGS).expect(200);
    await owner
      .put(`/api/shop/listings/${listingId}/state`)
      .set('if-match', '"1"')
      .send({ state: 'published' })
      .expect(200);
    const lines = [{ listingId, finishId: 'bare', quantity: 1 }];
    const offer = await owner.post('/api/shops/matrix/offers').send({ lines }).expect(200);
    const placed = await owner
      .post('/api/shops/matrix/sales')
      .set(...idempotencyKey())
      .send({ lines, offerHash: offer.body.offerHash, email: 'buyer@example.test', address: ADDRESS })
      .expect(201);
    const { body: sale } = await owner.get(`/api/sale-links/${placed.body.link}`).expect(200);
    await owner
      .post(`/api/sale-links/${placed.body.link}/messages`)
      .set(...idempotencyKey())
      .send({ text: 'Does it fit?' })
      .expect(201);
    const { body: questions } = await owner.get('/api/questions').expect(200);
    const [shipmentId, refundId] = [randomUUID(), randomUUID()];
    await asOwner(test.ownerUrl, async (client) => {
      await client.query(
        `INSERT INTO shipments (id, workshop_id, sale_id, number, carrier, shipped_at) VALUES ($1, $2, $3, 1, 'Post', now())`,
        [shipmentId, workshop, sale.id],
      );
      await client.query(
        `INSERT INTO refunds (id, workshop_id, sale_id, key, payment_id, amount_minor, reason, state, problem, asked_at)
         VALUES ($1, $2, $3, 'matrix', 'pi_1', 100, 'r', 'failed', 'no', now())`,
        [refundId, workshop, sale.id],
      );
    });
    const photo = await owner
      .post(`/api/shop/listings/${listingId}/photos`)
      .field({ description: 'On the cart' })
      .attach('file', jpeg, 'cart.jpg')
      .expect(201);
    const invited = await owner
      .post('/api/office/invitations')
      .set(...idempotencyKey())
      .send({ email: 'invited@example.test', role: 'viewer' })
      .expect(201);
    const spare = await addPerson(test.ownerUrl, 'Spare Member', { [workshop]: 'viewer' });
    const ofRevision = await owner.get(`/api/revisions/${revisionId}`).expect(200);
    const said = { revisionId, place: null, text: 'A comment' };
    const commentId = await made(`/api/parts/${ofRevision.body.partId}/comments`, said);
    await made(`/api/revisions/${revisionId}/review-links`, { guestName: 'Noor', guestEmail: null, days: 7 });
    const { body: reviews } = await owner.get(`/api/parts/${ofRevision.body.partId}/reviews`).expect(200);
    const review = { commentId, reviewLinkId: String(reviews.links[0].id) };
    const work = { ...review, workId: randomUUID(), messageId: randomUUID(), mailId: randomUUID() };
    const members = { ...work, memberId: spare.id, invitationId: String(invited.body.id) };
    const questionId = String(questions.questions[0].id);
    const listingPhotoId = String(photo.body.photos[0].id);
    const link = String(placed.body.link);
    return {
      ...members,
      shop: 'matrix',
      listing: 'matrix',
      link,
      listingPhotoId,
      hardwareId,
      kitId,
      positionId,
      listingId,
      saleId: String(sale.id),
      shipmentId,
      refundId,
      questionId,
    };
  }

  /** A quote and an order as the cutting service's answers would have left them. */
  async function addQuoteAndOrder(partId: string, revisionId: string, hash: string) {
    const ids = { quoteId: randomUUID(), orderId: randomUUID() };
    const price = { amountMinor: 1000, currency: 'EUR' };
    const lines = [{ label: 'Cutting', amount: price }];
    const breaks = [{ quantity: 1, each: price, total: price, lines, leadTimeDays: 5 }];
    await asOwner(test.ownerUrl, async (client) => {
      const { rows } = await client.query('SELECT released_by FROM revisions WHERE id = $1', [revisionId]);
      const person = String(rows[0].released_by);
      await client.query(
        `INSERT INTO quotes (id, workshop_id, revision_id, revision_letter, revision_hash, stock, stock_label, statement,
           quantities, state, breaks, quote_reference, valid_until, asked_by, asked_at, idempotency_key)
         VALUES ($1, $2, $3, 'A', $4, 'production', 'sheet', 'cut-and-bend-to-our-flat', '[1]', 'priced', $5, 'Q-1',
           now() + interval '1 day', $6, now(), 'matrix')`,
        [ids.quoteId, workshop, revisionId, hash, JSON.stringify(breaks), person],
      );
      await client.query(
        `INSERT INTO orders (id, workshop_id, number, quote_id, quote_reference, part_id, part_name, part_number,
           revision_id, revision_letter, revision_hash, stock, stock_label, statement, quantity, total_minor, currency,
           lines, lead_time_days, state, payment_state, revision, placed_by, placed_by_name, placed_by_email, placed_at)
         VALUES ($1, $2, 1, $3, 'Q-1', $4, 'Released', 'LC-01', $5, 'A', $6, 'production', 'sheet',
           'cut-and-bend-to-our-flat', 1, 1000, 'EUR', $7, 5, 'placed', 'open', 1, $8, 'Owner', 'owner@example.test', now())`,
        [ids.orderId, workshop, ids.quoteId, partId, revisionId, hash, JSON.stringify(lines), person],
      );
    });
    return ids;
  }

  function call(browser: TestBrowser, contract: RouteContract, ids: Ids): request.Test {
    const address = contract.path.replace(/:(\w+)/g, (_whole, name: string) =>
      name === 'kind'
        ? 'dxf'
        : name === 'queue'
          ? 'mail'
          : (Object.entries(ids).find(([key]) => key === name)?.[1] ?? 'unknown'),
    );
    const url = `${address}${QUERIES[contract.id] ?? ''}`;
    const methods = {
      GET: () => browser.get(url),
      POST: () => browser.post(url),
      PUT: () => browser.put(url),
      PATCH: () => browser.patch(url),
      DELETE: () => browser.delete(url),
    };
    const sent = methods[contract.method]();
    if (contract.ifMatch) sent.set('if-match', '"1"');
    if (contract.idempotent) sent.set(...idempotencyKey());
    if (contract.bodyKind === 'upload') {
      return sent.field(FIELDS[contract.id] ?? {}).attach('file', jpeg, 'template.jpg');
    }
    const body = BODIES[contract.id];
    return body === undefined ? sent : sent.send(body(ids, workshop));
  }

  /** What is the same for a missing row and a foreign one, whatever it was called. */
  const bare = (answer: request.Response): unknown => {
    const { requestId: _id, instance: _instance, ...rest } = answer.body;
    return { status: answer.status, type: answer.headers['content-type'], rest };
  };

  // Signing out and another workshop take the browser away from the other routes; the stream never ends by itself.
  // They are tested elsewhere.
  const ELSEWHERE = ['signOut', 'streamEvents', 'createWorkshop'];
  const CONTRACTS = ROUTE_CONTRACTS.filter(({ id }) => !ELSEWHERE.includes(id));
  const guarded = CONTRACTS.filter(({ access }) => access !== 'public' && access !== 'service');
  /** An operator stands outside of workshops: no row is foreign to one. */
  const isOfOperator = ({ access }: RouteContract) => Array.isArray(access) && access.includes('operator');
  const withRow = guarded.filter(
    (contract) => contract.path.includes('/:') && Array.isArray(contract.access) && !isOfOperator(contract),
  );

  it.each(ROUTE_CONTRACTS.filter(({ access }) => access !== 'public' && access !== 'service'))(
    '$id: nobody gets in without signing in',
    async (contract) => {
      const stranger = await new TestBrowser(test.app).open();
      const answer = await call(stranger, contract, own);
      expect(answer.status).toBe(401);
      expect(answer.body.type).toBe('/problems/not-signed-in');
    },
  );

  describe.each(ROLES)('%s', (role) => {
    it.each(guarded)('$id: in the own workshop as the contract says', async (contract) => {
      const answer = await call(browserOf(here, role), contract, own);
      const isMeant = contract.access === 'signed-in' || contract.access.includes(role);
      if (!isMeant) {
        expect(answer.status).toBe(403);
        expect(answer.body.type).toBe('/problems/not-allowed');
        return;
      }
      // What somebody did before may make it too late, or an outside service may be away; refused they are not.
      if ((contract.access === 'signed-in' || isOfOperator(contract)) && answer.status === 404) return;
      expect([contract.successStatus, 409, 412, 422, 503]).toContain(answer.status);
    });

    it.each(withRow)('$id: a row of another workshop is as missing', async (contract) => {
      const browser = browserOf(elsewhere, role);
      const foreign = await call(browser, contract, own);
      const absent = await call(browser, contract, missing);
      expect(bare(foreign)).toEqual(bare(absent));
      const isMeant = contract.access !== 'signed-in' && contract.access !== 'public' && contract.access.includes(role);
      expect(foreign.status).toBe(isMeant ? 404 : 403);
    });
  });

  it.each(['listParts', 'listOrders', 'listMails', 'listMembers', 'listAuditTrail'])(
    '%s shows nothing of another workshop',
    async (id) => {
      const contract = ROUTE_CONTRACTS.find((one) => one.id === id);
      if (contract === undefined) throw new Error(`There is no route ${id}.`);
      const mine = await call(browserOf(here, 'owner'), contract, own).expect(200);
      const theirs = await call(browserOf(elsewhere, 'owner'), contract, own).expect(200);
      const idsIn = (answer: request.Response) => new Set(answer.text.match(/[0-9a-f]{8}-[0-9a-f-]{27}/g) ?? []);
      const shared = [...idsIn(theirs)].filter((one) => idsIn(mine).has(one));
      expect(shared).toEqual([]);
    },
  );

  it('place an order only on a quote of one’s own', async () => {
    const contract = ROUTE_CONTRACTS.find(({ id }) => id === 'placeOrder');
    if (contract === undefined) throw new Error('There is no route placeOrder.');
    const browser = browserOf(elsewhere, 'owner');
    const [foreign, absent] = [await call(browser, contract, own), await call(browser, contract, missing)];
    expect(bare(foreign)).toEqual(bare(absent));
    expect(foreign.status).toBe(404);
  });

  it('serves what is for everybody to everybody, and takes from services only what is signed', async () => {
    for (const contract of CONTRACTS) {
      if (contract.access !== 'public' && contract.access !== 'service') continue;
      // Somebody new each time: signing up gives the session another token.
      const stranger = await new TestBrowser(test.app).open();
      const answer = await call(stranger, contract, own);
      if (contract.access === 'service') expect([400, 401, 403]).toContain(answer.status);
      // A sale’s link opens no thread, an old offer is refused, an outside service may be away: nobody is sent away.
      else expect([200, 201, 401, 404, 409, 412, 503]).toContain(answer.status);
      if (answer.status === 401 && contract.access === 'public')
        expect(answer.body.type).toBe('/problems/wrong-sign-in');
    }
  });

  it('breaks nowhere', () => {
    expect(test.loggedErrors.filter((line) => line.includes('unforeseen'))).toEqual([]);
  });
});
