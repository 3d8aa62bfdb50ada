import { HttpEventType, provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { Injector, runInInjectionContext, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { cancelOrder } from '@foldwright/shared/contracts/orders';
import { readPart, renamePart } from '@foldwright/shared/contracts/parts';
import { uploadPhoto } from '@foldwright/shared/contracts/photos';
import { ApiClient, type UploadProgress } from './api-client';
import { SessionToken } from './session-token';

const PART_ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const OTHER_ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c12';
const PART = {
  id: PART_ID,
  number: 'LC-07',
  name: 'Grinder cradle',
  revision: 3,
  draft: null,
  revisions: [],
  photos: [],
  hand: 'either',
  otherHandPartId: null,
  canEdit: true,
};
const problem = (slug: string, status: number, more: object = {}) => ({
  body: { type: `/problems/${slug}`, title: 'No', status, detail: 'Why', instance: '/x', ...more },
  options: { status, statusText: '' },
});
const settled = () => new Promise((resolve) => setTimeout(resolve));

describe('ApiClient', () => {
  function open() {
    TestBed.configureTestingModule({ providers: [provideHttpClient(), provideHttpClientTesting()] });
    TestBed.inject(SessionToken).renew('t1');
    return { client: TestBed.inject(ApiClient), http: TestBed.inject(HttpTestingController) };
  }

  it('sends path, body, revision and token, and answers what the contract promises', async () => {
    const { client, http } = open();
    const body = { name: 'Grinder cradle', number: 'LC-07' };
    const answer = client.call(renamePart, { params: { partId: PART_ID }, body, ifMatch: 2 });
    const sent = http.expectOne({ method: 'PATCH', url: `/api/parts/${PART_ID}` });
    expect(sent.request.body).toEqual(body);
    expect(sent.request.headers.get('If-Match')).toBe('"2"');
    expect(sent.request.headers.get('x-csrf-token')).toBe('t1');
    sent.flush(PART);
    expect((await answer).revision).toBe(3);
  });

  it('refuses an answer that breaks the contract', async () => {
    const { client, http } = open();
    const answer = client.call(readPart, { params: { partId: PART_ID } });
    http.expectOne(`/api/parts/${PART_ID}`).flush({ ...PART, revision: 'three' });
    await expect(answer).rejects.toMatchObject({ slug: 'unreadable-answer' });
  });

  it('counts a request that nobody answers in time as no connection', async () => {
    const { client, http } = open();
    const answer = client.call(readPart, { params: { partId: PART_ID } }, 15_000);
    const sent = http.expectOne(`/api/parts/${PART_ID}`);
    expect(sent.request.timeout).toBe(15_000);
    sent.error(new ProgressEvent('timeout'), { status: 0, statusText: 'Request timeout' });
    await expect(answer).rejects.toMatchObject({ slug: 'offline' });
  });

  it('tells problems by slug, with the field that is wrong', async () => {
    const { client, http } = open();
    const answer = client.call(renamePart, { params: { partId: PART_ID }, body: { name: '', number: '' }, ifMatch: 2 });
    const { body, options } = problem('invalid-input', 400, { errors: [{ pointer: '/name', detail: 'Too short' }] });
    http.expectOne(`/api/parts/${PART_ID}`).flush(body, options);
    const failure = await answer.catch((error: unknown) => error);
    expect(failure).toMatchObject({ slug: 'invalid-input', status: 400 });
    expect(failure).toHaveProperty('details.errors.0.detail', 'Too short');
  });

  it('says when there is no connection, and when the answer is no problem of ours', async () => {
    const { client, http } = open();
    const lost = client.call(readPart, { params: { partId: PART_ID } });
    http.expectOne(`/api/parts/${PART_ID}`).error(new ProgressEvent('error'));
    await expect(lost).rejects.toMatchObject({ slug: 'offline' });
    const strange = client.call(readPart, { params: { partId: PART_ID } });
    http.expectOne(`/api/parts/${PART_ID}`).flush('<html>', { status: 502, statusText: '' });
    await expect(strange).rejects.toMatchObject({ slug: 'unreadable-answer' });
  });

  it('renews an old token once and sends the change again', async () => {
    const { client, http } = open();
    const answer = client.call(cancelOrder, { params: { orderId: PART_ID }, ifMatch: 1 });
    const { body, options } = problem('bad-csrf-token', 403);
    http.expectOne(`/api/orders/${PART_ID}/cancel`).flush(body, options);
    http.expectOne('/api/session').flush({ user: null, memberships: [], current: null, csrfToken: 't2' });
    const again = http.expectOne(`/api/orders/${PART_ID}/cancel`);
    expect(again.request.headers.get('x-csrf-token')).toBe('t2');
    again.flush(body, options);
    await expect(answer).rejects.toMatchObject({ slug: 'bad-csrf-token' });
    http.verify();
  });

  it('keeps the last value while it reads again, but not that of another address', async () => {
    const { client, http } = open();
    const partId = signal(PART_ID);
    const read = runInInjectionContext(TestBed.inject(Injector), () =>
      client.read(readPart, () => ({ params: { partId: partId() } })),
    );
    TestBed.tick();
    http.expectOne(`/api/parts/${PART_ID}`).flush(PART);
    await settled();
    expect(read.value()?.name).toBe('Grinder cradle');
    read.reload();
    TestBed.tick();
    const { body, options } = problem('internal', 500);
    http.expectOne(`/api/parts/${PART_ID}`).flush(body, options);
    await settled();
    expect(read.value()?.name).toBe('Grinder cradle');
    expect(read.problem()?.slug).toBe('internal');
    partId.set(OTHER_ID);
    TestBed.tick();
    expect(read.value()).toBeUndefined();
  });

  it('uploads fields before the file and tells how far it is', async () => {
    const { client, http } = open();
    const seen: UploadProgress<unknown>[] = [];
    const file = new File(['abcd'], 'photo.jpg');
    const body = { templateKind: 'card', templateThicknessMm: 0.5, rulerXMm: 100, rulerYMm: 100 } as const;
    client.upload(uploadPhoto, { params: { partId: PART_ID }, body }, file).subscribe((step) => seen.push(step));
    const sent = http.expectOne(`/api/parts/${PART_ID}/photos`);
    expect([...(sent.request.body as FormData).keys()]).toEqual([
      'templateKind',
      'templateThicknessMm',
      'rulerXMm',
      'rulerYMm',
      'file',
    ]);
    sent.event({ type: HttpEventType.UploadProgress, loaded: 2, total: 4 });
    sent.flush({
      id: OTHER_ID,
      partId: PART_ID,
      fileName: 'photo.jpg',
      templateKind: 'card',
      templateThicknessMm: 0.5,
      widthPx: null,
      heightPx: null,
      uploadedAt: '2026-05-03T10:00:00Z',
      uploadedBy: 'Tomasz Wren',
      job: null,
      trace: null,
      rectified: null,
    });
    expect(seen.map((step) => step.kind)).toEqual(['sending', 'done']);
    expect(seen[0]).toEqual({ kind: 'sending', sentBytes: 2, totalBytes: 4 });
  });
});
