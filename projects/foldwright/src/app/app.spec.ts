import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { OrdersApi } from './api/orders-api';
import { watchForSignedOut } from './api/signed-out-watch';
import { App } from './app';

describe('App', () => {
  async function start() {
    TestBed.configureTestingModule({
      imports: [App],
      providers: [
        provideRouter([{ path: '**', children: [] }]),
        provideHttpClient(withInterceptors([watchForSignedOut])),
        provideHttpClientTesting(),
      ],
    });
    const fixture = TestBed.createComponent(App);
    await TestBed.inject(Router).navigateByUrl('/orders?late=1');
    await fixture.whenStable();
    return fixture;
  }

  it('offers an outlet for the areas', async () => {
    const fixture = await start();
    expect(fixture.nativeElement.querySelector('router-outlet')).not.toBeNull();
  });

  it('asks to sign in again when the server no longer knows who is asking, and remembers where', async () => {
    await start();
    const http = TestBed.inject(HttpTestingController);
    const asked = TestBed.inject(OrdersApi).openCheckout('5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11');
    const problem = { type: '/problems/not-signed-in', title: 'Sign in first', status: 401, detail: '', instance: '/' };
    http.expectOne((request) => request.url.endsWith('/checkout')).flush(problem, { status: 401, statusText: '' });
    await expect(asked).rejects.toMatchObject({ slug: 'not-signed-in' });
    http.expectOne('/api/session').flush({ user: null, memberships: [], current: null, csrfToken: 't' });
    await new Promise((resolve) => setTimeout(resolve));
    expect(TestBed.inject(Router).url).toBe('/sign-in?to=%2Forders%3Flate%3D1');
  });
});
