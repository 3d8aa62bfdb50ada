import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { EMPTY } from 'rxjs';
import { LiveEvents } from '../../api/live-events';
import { Notices } from '../../api/notices';
import { SessionApi } from '../../api/session-api';
import { MembersSection } from './members-section';

const [IMOGEN, ADA, WORKSHOP] = [
  '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11',
  '6f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c12',
  '7f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c13',
];
const MEMBERS = [
  { userId: ADA, name: 'Ada Quill', email: 'ada@example.test', role: 'viewer', revision: 3 },
  { userId: IMOGEN, name: 'Imogen Harrow', email: 'imogen@example.test', role: 'owner', revision: 1 },
];
const invitation = (email: string, expiresAt: string) => ({
  ...{
    id: IMOGEN,
    email,
    role: 'fabricator',
    invitedBy: 'Imogen Harrow',
    sentAt: '2026-01-01T00:00:00.000Z',
    expiresAt,
  },
});
const session = (role: string) => {
  const current = { workshopId: WORKSHOP, workshopName: 'Larkfield Cartworks', role };
  return {
    user: { id: IMOGEN, name: 'Imogen Harrow', email: 'imogen@example.test', isOperator: false },
    ...{ memberships: [current], current, csrfToken: 't' },
  };
};
const refusal = (status: number, slug: string) => ({
  body: { type: `/problems/${slug}`, title: 'No', status, detail: 'No.', instance: '/' },
  how: { status, statusText: '' },
});

describe('MembersSection', () => {
  async function open(role: string, invitations: object[] = []) {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(),
        provideHttpClientTesting(),
        { provide: LiveEvents, useValue: { events: EMPTY, resumed: EMPTY } },
      ],
    });
    const http = TestBed.inject(HttpTestingController);
    const known = TestBed.inject(SessionApi).refresh();
    http.expectOne('/api/session').flush(session(role));
    await known;
    const fixture = TestBed.createComponent(MembersSection);
    const host = fixture.nativeElement as HTMLElement;
    // Not by whenStable: it waits for the very answers that are given here.
    const settle = async () => {
      for (let round = 0; round < 4; round += 1) {
        await new Promise((resolve) => setTimeout(resolve));
        TestBed.tick();
        http.match('/api/office/members').forEach((one) => one.flush({ members: MEMBERS }));
        http.match({ method: 'GET', url: '/api/office/invitations' }).forEach((one) => one.flush({ invitations }));
      }
    };
    fixture.detectChanges();
    await settle();
    const press = async (words: RegExp) => {
      const button = [...host.querySelectorAll('button')].find((one) => words.test(one.textContent ?? ''));
      if (button === undefined) throw new Error(`no button ${String(words)}`);
      button.click();
      await new Promise((resolve) => setTimeout(resolve));
    };
    const roleOf = (name: string) => {
      const select = host.querySelector<HTMLSelectElement>(`select[aria-label="Role of ${name}"]`);
      if (select === null) throw new Error(`no role of ${name}`);
      return select;
    };
    const choose = async (name: string, wanted: string) => {
      roleOf(name).value = wanted;
      roleOf(name).dispatchEvent(new Event('change'));
      await new Promise((resolve) => setTimeout(resolve));
      fixture.detectChanges();
    };
    const sendTo = async (email: string) => {
      const field = host.querySelector<HTMLInputElement>('input[type=email]');
      if (field === null) throw new Error('no field');
      field.value = email;
      field.dispatchEvent(new Event('input'));
      await press(/Send the invitation/);
      const sent = http.expectOne({ method: 'POST', url: '/api/office/invitations' });
      return { sent, key: sent.request.headers.get('Idempotency-Key') };
    };
    return { host, http, settle, press, roleOf, choose, sendTo };
  }

  it('offers a viewer no verbs', async () => {
    const { host, http } = await open('viewer');
    expect(host.textContent).toContain('Ada Quill');
    expect(host.querySelectorAll('button, select, form')).toHaveLength(0);
    http.verify();
  });

  it('changes a role on the revision that was seen', async () => {
    const { http, choose } = await open('owner');
    await choose('Ada Quill', 'fabricator');
    const sent = http.expectOne({ method: 'PUT', url: `/api/office/members/${ADA}/role` });
    expect(sent.request.body).toEqual({ role: 'fabricator' });
    expect(sent.request.headers.get('If-Match')).toBe('"3"');
  });

  it('shows what is stored after a refusal, and says why', async () => {
    const { http, choose, roleOf, settle } = await open('owner');
    await choose('Ada Quill', 'owner');
    const { body, how } = refusal(412, 'stale-row');
    http.expectOne({ method: 'PUT', url: `/api/office/members/${ADA}/role` }).flush(body, how);
    await settle();
    expect(roleOf('Ada Quill').value).toBe('viewer');
    expect(TestBed.inject(Notices).current()?.title).toBe('No');
  });

  it('asks before somebody is removed, and takes no for an answer', async () => {
    const { host, http, press, settle } = await open('owner');
    await press(/Remove\s*Ada Quill/);
    await settle();
    expect(host.querySelector('[role=alertdialog]')?.textContent).toContain('Remove Ada Quill?');
    await press(/Leave it as it is/);
    await settle();
    expect(host.querySelector('[role=alertdialog]')).toBeNull();
    http.expectNone({ method: 'DELETE' });
    await press(/Remove\s*Ada Quill/);
    await settle();
    await press(/Remove them/);
    http.expectOne({ method: 'DELETE', url: `/api/office/members/${ADA}` }).flush(null);
    await settle();
    expect(TestBed.inject(Router).url).toBe('/');
  });

  it('asks before an owner gives up being one, and then shows what they may do now', async () => {
    const { host, http, choose, press, settle, roleOf } = await open('owner');
    await choose('Imogen Harrow', 'viewer');
    await settle();
    expect(roleOf('Imogen Harrow').value).toBe('owner');
    await press(/Become viewer/);
    http.expectOne({ method: 'PUT', url: `/api/office/members/${IMOGEN}/role` }).flush(null);
    await settle();
    http.expectOne('/api/session').flush(session('viewer'));
    await settle();
    expect(host.querySelectorAll('button, select, form')).toHaveLength(0);
  });

  it('tries an invitation again under its key when no answer came, and makes a new one after an answer', async () => {
    const { settle, sendTo } = await open('owner');
    const first = await sendTo('new@example.test');
    first.sent.error(new ProgressEvent('error'));
    await settle();
    const second = await sendTo('new@example.test');
    expect(second.key).toBe(first.key);
    const { body, how } = refusal(429, 'too-many-requests');
    second.sent.flush(body, how);
    await settle();
    const third = await sendTo('new@example.test');
    expect(third.key).not.toBe(first.key);
    third.sent.flush(invitation('new@example.test', '2099-01-01T00:00:00.000Z'), { status: 201, statusText: '' });
    await settle();
    expect(TestBed.inject(Notices).current()?.detail).toContain('new@example.test');
  });

  it('lists who was invited, and who let it run out', async () => {
    const { host } = await open('owner', [
      invitation('soon@example.test', '2099-03-04T12:00:00.000Z'),
      { ...invitation('late@example.test', '2020-03-04T12:00:00.000Z'), id: ADA },
    ]);
    expect(host.textContent).toMatch(/soon@example\.test as fabricator,\s*until 4 March 2099/);
    expect(host.textContent).toMatch(/late@example\.test as fabricator,\s*ran out on 4 March 2020/);
  });
});
