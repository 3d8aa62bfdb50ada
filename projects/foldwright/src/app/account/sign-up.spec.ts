import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { SignUp } from './sign-up';

const session = (email: string | null) => ({
  user:
    email === null ? null : { id: '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11', name: 'Noor Vale', email, isOperator: false },
  memberships: [],
  current: null,
  csrfToken: 't',
});

describe('SignUp', () => {
  async function open(signedInAs: string | null) {
    TestBed.configureTestingModule({
      providers: [provideRouter([{ path: '**', children: [] }]), provideHttpClient(), provideHttpClientTesting()],
    });
    const fixture = TestBed.createComponent(SignUp);
    fixture.detectChanges();
    const host = fixture.nativeElement as HTMLElement;
    const http = TestBed.inject(HttpTestingController);
    const settle = async () => {
      await new Promise((resolve) => setTimeout(resolve));
      await fixture.whenStable();
    };
    const field = (name: string) => {
      const found = host.querySelector<HTMLInputElement>(`input[formcontrolname=${name}]`);
      if (found === null) throw new Error(`no ${name}`);
      return found;
    };
    const fill = (name: string, text: string) => {
      field(name).value = text;
      field(name).dispatchEvent(new Event('input'));
    };
    const submit = async () => {
      host.querySelector('form')?.dispatchEvent(new Event('submit'));
      await settle();
    };
    http.expectOne('/api/session').flush(session(signedInAs));
    await settle();
    return { host, http, field, fill, submit, settle };
  }

  it('proposes the letters of the name, until somebody types their own', async () => {
    const { field, fill } = await open(null);
    fill('workshopName', 'Vale Brackets');
    expect(field('numberPrefix').value).toBe('VB');
    fill('numberPrefix', 'NV');
    fill('workshopName', 'Other Name');
    expect(field('numberPrefix').value).toBe('NV');
  });

  it('sends nothing before all is there, then once, and goes to the parts', async () => {
    const { host, http, fill, submit, settle } = await open(null);
    await submit();
    for (const words of ['Type what the workshop is called', 'Type your name', 'At least 10 letters']) {
      expect(host.textContent).toContain(words);
    }
    const wish = { name: 'Noor Vale', email: 'noor@vale.example.test', password: 'a long enough secret' };
    Object.entries({ ...wish, workshopName: 'Vale Brackets' }).forEach(([name, text]) => fill(name, text));
    await submit();
    await submit();
    const sent = http.expectOne('/api/sign-up');
    expect(sent.request.body).toEqual({ ...wish, workshopName: 'Vale Brackets', numberPrefix: 'VB' });
    sent.flush(session(wish.email));
    await settle();
    expect(TestBed.inject(Router).url).toBe('/parts');
  });

  it('sends somebody who is signed in to their account', async () => {
    const { host } = await open('noor@vale.example.test');
    expect(host.querySelector('form')).toBeNull();
    expect(host.querySelector('a[href="/account"]')).not.toBeNull();
  });
});
