import { randomUUID } from 'node:crypto';
import * as parts from '@foldwright/shared/contracts/parts';
import * as sessions from '@foldwright/shared/contracts/session';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { AppDependencies } from '@foldwright/server/app-dependencies';
import { partRoutes } from '@foldwright/server/routes/parts';
import { sessionRoutes } from '@foldwright/server/routes/session';
import { contractsIn } from '../support/contracts-in';
import type { TestPerson } from '../support/people';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

const L_BRACKET = { shape: 'l-bracket', baseMm: 60, flangeMm: 40, widthMm: 80, bendAngleDeg: 90 } as const;
const routes = (dependencies: AppDependencies) => [...sessionRoutes(dependencies), ...partRoutes(dependencies)];

describe('parts and drafts', () => {
  let test: TestApp;
  let workshop: string;
  let imogen: TestPerson;
  let owner: TestBrowser;
  let fabricator: TestBrowser;
  let viewer: TestBrowser;

  beforeAll(async () => {
    test = await startTestApp({ routes, contracts: contractsIn(sessions, parts), poolSize: 1 });
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    imogen = await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' });
    owner = await new TestBrowser(test.app).signIn(imogen);
    const tomasz = await addPerson(test.ownerUrl, 'Tomasz Wren', { [workshop]: 'fabricator' });
    fabricator = await new TestBrowser(test.app).signIn(tomasz);
    viewer = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Ada Quill', { [workshop]: 'viewer' }),
    );
  });
  afterAll(() => test.close());
  afterEach(() => expect(test.loggedErrors.splice(0)).toEqual([]));

  const create = (body: object, key: string = randomUUID()) =>
    owner
      .post('/api/parts')
      .set('idempotency-key', key)
      .send({ starter: L_BRACKET, ...body });

  const newDraft = async (name: string): Promise<{ partId: string; draft: parts.Draft }> => {
    const created = await create({ name }).expect(201);
    const { body } = await owner.get(`/api/drafts/${created.body.draft.id}`).expect(200);
    return { partId: created.body.id, draft: parts.draftSchema.parse(body) };
  };

  const send = (
    browser: TestBrowser,
    draftId: string,
    baseRevision: number,
    commands: PartCommand[],
    batchId: string = randomUUID(),
  ) => browser.post(`/api/drafts/${draftId}/commands`).send({ baseRevision, batchId, clientId: 'tab-1', commands });

  const hole = (id: string, x: number): PartCommand => ({
    kind: 'addFeature',
    feature: { kind: 'hole', id, centre: { x, y: 40 }, purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' } },
  });

  it('starts a part from typed sizes, numbered after the workshop', async () => {
    const { body } = await create({ name: 'Regulator bracket' }).expect(201);
    expect(body).toMatchObject({
      number: 'LC-01',
      name: 'Regulator bracket',
      canEdit: true,
      revisions: [],
      photos: [],
      hand: 'either',
      otherHandPartId: null,
    });
    expect(body.draft).toMatchObject({ letter: 'A', revision: 0, furthestStep: 'outline', updatedBy: 'Imogen Harrow' });
    const list = await viewer.get('/api/parts?search=regul').expect(200);
    expect(list.body.parts).toHaveLength(1);
    expect(list.body.parts[0]).toMatchObject({ state: 'blued', openQuestion: null });
    expect(list.body.parts[0].document.layout.bends).toHaveLength(1);
  });

  it('starts a part for a mock-up with nothing to show yet', async () => {
    const created = await create({ name: 'Umbrella foot', number: 'LC-15', starter: null }).expect(201);
    expect(created.body.draft.furthestStep).toBe('mock-up');
    const { body } = await owner.get('/api/parts?search=LC-15').expect(200);
    expect(body.parts[0]).toMatchObject({ document: null, state: 'card', openQuestion: 'No photo of the mock-up yet' });
    const next = await create({ name: 'Kettle rail' }).expect(201);
    expect(next.body.number).toBe('LC-16');
  });

  it('does a double click once, and refuses the key for something else', async () => {
    const key = randomUUID();
    const [first, second] = await Promise.all([create({ name: 'Pump tray' }, key), create({ name: 'Pump tray' }, key)]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.body).toEqual(first.body);
    const { body } = await owner.get('/api/parts?search=Pump tray').expect(200);
    expect(body.parts).toHaveLength(1);
    const other = await create({ name: 'Pump tray two' }, key).expect(409);
    expect(other.body.type).toBe('/problems/already-exists');
    await owner.post('/api/parts').send({ name: 'Keyless', starter: null }).expect(428);
  });

  it('points at a number that is taken', async () => {
    await create({ name: 'One', number: 'X-1' }).expect(201);
    const { body } = await create({ name: 'Two', number: 'X-1' }).expect(409);
    expect(body).toMatchObject({ type: '/problems/already-exists', errors: [{ pointer: '/number' }] });
  });

  it('says in words which sizes do not go together', async () => {
    const gusset = { shape: 'gusseted-l', baseMm: 90, flangeMm: 40, widthMm: 60, gussetMm: 41 };
    const refused = await create({ name: 'Gusset', starter: gusset }).expect(400);
    expect(refused.body).toMatchObject({
      type: '/problems/invalid-input',
      detail: 'A gusset of 41 mm doesn’t fit: on this base and flange it lies between 12 and 40 mm.',
    });
    const made = await create({ name: 'Gusset', starter: { ...gusset, gussetMm: 35 } }).expect(201);
    expect(made.body).toMatchObject({ name: 'Gusset' });
  });

  it('lists everything wrong with a new part at once', async () => {
    const { body } = await create({
      name: '  ',
      starter: { shape: 'l-bracket', baseMm: -1, flangeMm: 'x', widthMm: 80, bendAngleDeg: 200 },
      colour: 'blue',
    }).expect(400);
    expect(body.errors.map((error: { pointer: string }) => error.pointer).sort()).toEqual([
      '/colour',
      '/name',
      '/starter/baseMm',
      '/starter/bendAngleDeg',
      '/starter/flangeMm',
    ]);
  });

  it('renames only on top of what was seen', async () => {
    const created = await create({ name: 'Sign bracket' }).expect(201);
    expect(created.headers['etag']).toBe('"1"');
    const rename = (name: string, seen: string | null) => {
      const request = owner.patch(`/api/parts/${created.body.id}`);
      if (seen !== null) request.set('if-match', seen);
      return request.send({ name, number: 'LC-40' });
    };
    await rename('Sign', null).expect(428);
    await rename('Sign', 'yesterday').expect(400);
    const renamed = await rename('Sign plate', '"1"').expect(200);
    expect(renamed.body).toMatchObject({ name: 'Sign plate', number: 'LC-40', revision: 2 });
    const stale = await rename('Sign post', '"1"').expect(412);
    expect(stale.body).toMatchObject({ type: '/problems/stale-row', extra: { name: 'Sign plate', revision: 2 } });
  });

  it('applies commands, keeps them in the history and computes at once', async () => {
    const { draft } = await newDraft('Commanded');
    const sent = await send(owner, draft.id, 0, [hole('h1', 20), hole('h2', 45)]).expect(200);
    expect(sent.body).toMatchObject({ revision: 1, updatedBy: 'Imogen Harrow' });
    expect(sent.body.document.layout.features).toHaveLength(2);
    const history = await viewer.get(`/api/drafts/${draft.id}/history`).expect(200);
    expect(history.body.entries).toMatchObject([{ revision: 1, by: 'Imogen Harrow', clientId: 'tab-1' }]);
    const computed = await viewer.get(`/api/drafts/${draft.id}/computed?stock=production`).expect(200);
    expect(computed.body.revision).toBe(1);
    expect(computed.body.computed.development.flat.holes).toHaveLength(2);
    expect(computed.body.computed.development.bendTable).toHaveLength(1);
    expect(computed.body.computed.development).not.toHaveProperty('panels');
  });

  it('takes a batch that arrives twice once, even at the same moment', async () => {
    const { draft } = await newDraft('Twice');
    const batchId = randomUUID();
    const [first, second] = await Promise.all([
      send(owner, draft.id, 0, [hole('h1', 20)], batchId),
      send(owner, draft.id, 0, [hole('h1', 20)], batchId),
    ]);
    expect([first.status, second.status]).toEqual([200, 200]);
    expect(second.body).toEqual(first.body);
    const again = await send(owner, draft.id, 0, [hole('h1', 20)], batchId).expect(200);
    expect(again.body.document.layout.features).toHaveLength(1);
    expect(again.body.revision).toBe(1);
  });

  it('lets two editors never overwrite each other', async () => {
    const { draft } = await newDraft('Shared');
    const answers = await Promise.all([
      send(owner, draft.id, 0, [hole('h1', 20)]),
      send(fabricator, draft.id, 0, [hole('h2', 45)]),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const late = answers.find(({ status }) => status === 409);
    expect(late?.body.type).toBe('/problems/draft-moved-on');
    const extra = parts.draftMovedOnExtraSchema.parse(late?.body.extra);
    expect(extra.draft.revision).toBe(1);
    expect(extra.since).toHaveLength(1);
    const loser = answers[0].status === 409 ? owner : fabricator;
    const rebased = await send(loser, draft.id, 1, [answers[0].status === 409 ? hole('h1', 20) : hole('h2', 45)]);
    expect(rebased.status).toBe(200);
    expect(rebased.body.document.layout.features).toHaveLength(2);
  });

  it('refuses a command that can’t be applied and changes nothing of its batch', async () => {
    const { draft } = await newDraft('Refused');
    const answer = await send(owner, draft.id, 0, [hole('h1', 20), { kind: 'removeFeature', featureId: 'nowhere' }]);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ type: '/problems/command-refused', extra: { code: 'unknownEntity' } });
    const { body } = await owner.get(`/api/drafts/${draft.id}`).expect(200);
    expect(body).toMatchObject({ revision: 0, document: { layout: { features: [] } } });
  });

  it('releases: frozen, hashed, with files, and the next change starts draft B', async () => {
    const { draft, partId } = await newDraft('Released');
    const release = (key: string) =>
      owner
        .post(`/api/drafts/${draft.id}/release`)
        .set('idempotency-key', key)
        .send({ baseRevision: 0, note: 'First fit in steel.', acceptedCautionIds: [] });
    const key = randomUUID();
    const [first, second] = await Promise.all([release(key), release(key)]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(first.body).toEqual(second.body);
    expect(first.body).toMatchObject({ letter: 'A', note: 'First fit in steel.', releasedBy: 'Imogen Harrow' });
    expect(first.body.hash).toMatch(/^[0-9a-f]{64}$/);
    const closed = await send(owner, draft.id, 0, [hole('h1', 20)]);
    expect(closed.body.type).toBe('/problems/wrong-state');
    await release(randomUUID()).expect(409);

    const next = await owner.post(`/api/parts/${partId}/draft`).expect(201);
    expect(next.body).toMatchObject({ letter: 'B', revision: 0, document: draft.document });
    await owner.post(`/api/parts/${partId}/draft`).expect(409);
    const { rows } = await asOwner(test.ownerUrl, (client) =>
      client.query('SELECT kind, stock, paper FROM revision_files ORDER BY kind, stock, paper'),
    );
    expect(rows).toHaveLength(8);
  });

  it('refuses to release what can’t be made, and what was changed meanwhile', async () => {
    const { draft } = await newDraft('Blocked');
    const sent = await send(owner, draft.id, 0, [hole('h1', 200)]).expect(200);
    expect(sent.body.revision).toBe(1);
    const release = (baseRevision: number) =>
      owner
        .post(`/api/drafts/${draft.id}/release`)
        .set('idempotency-key', randomUUID())
        .send({ baseRevision, note: '', acceptedCautionIds: [] });
    await release(0).expect(409);
    const answer = await release(1).expect(422);
    expect(['/problems/has-blockers', '/problems/cannot-be-developed']).toContain(answer.body.type);
    expect(answer.body.extra.findings.length).toBeGreaterThan(0);
  });

  it('prints the draft full size', async () => {
    const { draft } = await newDraft('Printed');
    const answer = await viewer
      .get(`/api/drafts/${draft.id}/full-size-print?paper=A4&stock=trial`)
      .buffer()
      .parse((response, done) => {
        const chunks: Buffer[] = [];
        response.on('data', (chunk: Buffer) => chunks.push(chunk));
        response.on('end', () => done(null, Buffer.concat(chunks)));
      })
      .expect(200);
    expect(answer.headers['content-type']).toBe('application/pdf');
    expect(answer.body.subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('lets a viewer look and change nothing', async () => {
    const { draft, partId } = await newDraft('Looked at');
    const seen = await viewer.get(`/api/parts/${partId}`).expect(200);
    expect(seen.body.canEdit).toBe(false);
    const refused = await send(viewer, draft.id, 0, [hole('h1', 20)]);
    expect(refused.status).toBe(403);
    expect(refused.body.type).toBe('/problems/not-allowed');
  });

  it('answers an edit with its flat pattern well within a tenth of a second', async () => {
    const { draft } = await newDraft('Quick');
    const times: number[] = [];
    for (let edit = 0; edit < 8; edit += 1) {
      const began = performance.now();
      await send(owner, draft.id, edit, [hole(`h${edit}`, 8 + edit * 3)]).expect(200);
      await owner.get(`/api/drafts/${draft.id}/computed?stock=production`).expect(200);
      times.push(performance.now() - began);
    }
    times.sort((a, b) => a - b);
    expect(times[3]).toBeLessThan(250);
  });
});
