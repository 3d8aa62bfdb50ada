import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { SignIn } from './sign-in';

const NOBODY = { user: null, memberships: [], current: null, csrfToken: 'first' };
const TOMASZ = {
  user: {
    id: '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11',
    name: 'Tomasz Wren',
    email: 'tomasz@example.test',
    isOperator: false,
  },
  memberships: [],
  current: null,
  csrfToken: 'second',
};

describe('SignIn', () => {
  async function open(to?: string) {
    TestBed.configureTestingModule({
      providers: [provideRouter([{ path: '**', children: [] }]), provideHttpClient(), provideHttpClientTesting()],
    });
    const fixture = TestBed.createComponent(SignIn);
    fixture.componentRef.setInput('to', to);
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    const http = TestBed.inject(HttpTestingController);
    const fill = (selector: string, text: string) => {
      const field = host.querySelector<HTMLInputElement>(selector);
      if (field === null) throw new Error(`no ${selector}`);
      field.value = text;
      field.dispatchEvent(new Event('input'));
    };
    const submit = async () => {
      host.querySelector('form')?.dispatchEvent(new Event('submit'));
      await fixture.whenStable();
    };
    return { fixture, host, http, fill, submit };
  }
  const settled = () => new Promise((resolve) => setTimeout(resolve));

  it('says what is missing before anything is sent', async () => {
    const { host, http, submit } = await open();
    await submit();
    expect(host.textContent).toContain('Type the e-mail address');
    expect(host.textContent).toContain('Type your password');
    http.expectNone('/api/session');
  });

  it('signs in with the token of the session and goes where the person wanted to', async () => {
    const { http, fill, submit } = await open('/orders');
    fill('input[type=email]', 'tomasz@example.test');
    fill('input[type=password]', 'correct horse');
    await submit();
    http.expectOne({ method: 'GET', url: '/api/session' }).flush(NOBODY);
    await settled();
    const sent = http.expectOne({ method: 'POST', url: '/api/session' });
    expect(sent.request.headers.get('x-csrf-token')).toBe('first');
    expect(sent.request.body).toEqual({ email: 'tomasz@example.test', password: 'correct horse' });
    sent.flush(TOMASZ);
    await settled();
    expect(TestBed.inject(Router).url).toBe('/orders');
  });

  it('tells in place what was wrong and keeps the address', async () => {
    const { host, http, fill, submit, fixture } = await open();
    fill('input[type=email]', 'tomasz@example.test');
    fill('input[type=password]', 'wrong');
    await submit();
    http.expectOne({ method: 'GET', url: '/api/session' }).flush(NOBODY);
    await settled();
    http.expectOne({ method: 'POST', url: '/api/session' }).flush(
      {
        type: '/problems/wrong-sign-in',
        title: 'E-mail or password is wrong',
        status: 401,
        detail: 'Try again.',
        instance: '/',
      },
      { status: 401, statusText: '' },
    );
    await settled();
    await fixture.whenStable();
    expect(host.querySelector('[role=alert]')?.textContent).toContain('E-mail or password is wrong');
    expect(host.querySelector<HTMLInputElement>('input[type=email]')?.value).toBe('tomasz@example.test');
  });

  it('never leads out of the application', async () => {
    const { http, fill, submit } = await open('//elsewhere.example');
    fill('input[type=email]', 'tomasz@example.test');
    fill('input[type=password]', 'correct horse');
    await submit();
    http.expectOne({ method: 'GET', url: '/api/session' }).flush(NOBODY);
    await settled();
    http.expectOne({ method: 'POST', url: '/api/session' }).flush(TOMASZ);
    await settled();
    expect(TestBed.inject(Router).url).toBe('/');
  });
});
