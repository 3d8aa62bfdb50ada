import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { InvitationPage } from './invitation-page';

const LINK = 'a-link-that-is-long-enough-to-be-one';
const READ = `/api/invitation-links/${LINK}`;
const INVITATION = {
  workshopName: 'Larkfield Cartworks',
  role: 'viewer',
  invitedBy: 'Imogen Harrow',
  email: 'ada@quill.example.test',
  hasAccount: false,
};
const ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const session = (email: string | null) => ({
  user: email === null ? null : { id: ID, name: 'Ada Quill', email, isOperator: false },
  memberships: [],
  current: null,
  csrfToken: 't',
});
const ended = (reason: string, detail: string) => ({
  type: '/problems/invitation-ended',
  title: 'This invitation can’t be used any more',
  ...{ status: 410, detail, next: 'Do this.', instance: '/', extra: { reason } },
});

describe('InvitationPage', () => {
  async function open(invitation: object | null, email: string | null) {
    TestBed.configureTestingModule({
      providers: [provideRouter([{ path: '**', children: [] }]), provideHttpClient(), provideHttpClientTesting()],
    });
    const fixture = TestBed.createComponent(InvitationPage);
    fixture.componentRef.setInput('link', LINK);
    fixture.detectChanges();
    const http = TestBed.inject(HttpTestingController);
    const host = fixture.nativeElement as HTMLElement;
    const settle = async () => {
      for (let round = 0; round < 3; round += 1) {
        await new Promise((resolve) => setTimeout(resolve));
        TestBed.tick();
      }
    };
    const press = async (words: string) => {
      const button = [...host.querySelectorAll('button')].find((one) => one.textContent?.includes(words));
      if (button === undefined) throw new Error(`no button ${words}`);
      button.click();
      await settle();
    };
    TestBed.tick();
    http.expectOne('/api/session').flush(session(email));
    const read = http.expectOne(READ);
    if (invitation === null) read.flush(NOT_FOUND, { status: 404, statusText: '' });
    else if ('status' in invitation) read.flush(invitation, { status: 410, statusText: '' });
    else read.flush(invitation);
    await settle();
    return { host, http, settle, press };
  }
  const NOT_FOUND = {
    type: '/problems/not-found',
    title: 'There is nothing here',
    status: 404,
    detail: '',
    instance: '/',
  };

  it('lets somebody new choose name and password, and goes in', async () => {
    const { host, http, settle, press } = await open(INVITATION, null);
    expect(host.textContent).toContain('Imogen Harrow invites ada@quill.example.test as viewer');
    await press('Join');
    expect(host.textContent).toContain('Type your name');
    http.expectNone(`${READ}/acceptance`);
    for (const [selector, text] of [
      ['input[autocomplete=name]', 'Ada Quill'],
      ['input[type=password]', 'a long enough secret'],
    ] as const) {
      const field = host.querySelector<HTMLInputElement>(selector);
      if (field === null) throw new Error(`no ${selector}`);
      field.value = text;
      field.dispatchEvent(new Event('input'));
    }
    await press('Join');
    // Pressed twice it is sent once.
    await press('Join');
    const sent = http.expectOne(`${READ}/acceptance`);
    expect(sent.request.body).toEqual({ account: { name: 'Ada Quill', password: 'a long enough secret' } });
    sent.flush(session(INVITATION.email));
    await settle();
    expect(TestBed.inject(Router).url).toBe('/');
  });

  it('joins with one press when the invited address is signed in', async () => {
    const { http, press } = await open({ ...INVITATION, hasAccount: true }, INVITATION.email);
    await press('Join');
    expect(http.expectOne(`${READ}/acceptance`).request.body).toEqual({ account: null });
  });

  it('joins nobody else: who is signed in under another address signs out first', async () => {
    const { host, http, press, settle } = await open({ ...INVITATION, hasAccount: true }, 'petra@example.test');
    expect(host.textContent).toContain('You are signed in as petra@example.test');
    expect(host.textContent).not.toContain('Join the workshop');
    await press('Sign out');
    http.expectOne({ method: 'DELETE', url: '/api/session' }).flush(null);
    await settle();
    http.expectOne('/api/session').flush(session(null));
    await settle();
    const onward = host.querySelector<HTMLAnchorElement>('a[href*="sign-in"]');
    expect(onward?.getAttribute('href')).toBe(`/sign-in?to=%2Finvitation%2F${LINK}`);
  });

  it.each([
    ['used', 'It was accepted already.', true],
    ['expired', 'It is older than seven days.', false],
    ['withdrawn', 'It was withdrawn.', false],
  ])('says that it is %s and what to do', async (reason, detail, offersSignIn) => {
    const { host } = await open(ended(reason, detail), null);
    expect(host.querySelector('h1')?.textContent).toContain('can’t be used any more');
    expect(host.textContent).toContain(`${detail} Do this.`);
    expect(host.querySelector('a') !== null).toBe(offersSignIn);
  });

  it('says of an unknown link that a piece may be missing', async () => {
    const { host } = await open(null, null);
    expect(host.textContent).toContain('Copy the whole link');
  });

  it('shows in place of the form that it ended while somebody typed', async () => {
    const { host, http, press, settle } = await open({ ...INVITATION, hasAccount: true }, INVITATION.email);
    await press('Join');
    const problem = ended('withdrawn', 'It was withdrawn.');
    http.expectOne(`${READ}/acceptance`).flush(problem, { status: 410, statusText: '' });
    await settle();
    http.expectOne(READ).flush(problem, { status: 410, statusText: '' });
    await settle();
    expect(host.textContent).toContain('It was withdrawn.');
    expect(host.querySelector('button')).toBeNull();
  });
});
