import { Location } from '@angular/common';
import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import type { Role } from '@foldwright/shared/contracts/route';
import { areasFor, homeFor } from './areas';
import { initialsOf } from './initials-of';
import { signedIn, toHome, withRole } from './session-guards';

const ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const session = (role: Role | null) => {
  const membership = { workshopId: ID, workshopName: 'Larkfield Cartworks', role };
  const isInside = role !== null && role !== 'operator';
  return {
    user:
      role === null ? null : { id: ID, name: 'Ada Quill', email: 'ada@example.test', isOperator: role === 'operator' },
    memberships: isInside ? [membership] : [],
    current: isInside ? membership : null,
    csrfToken: 't',
  };
};

describe('who is let in', () => {
  async function visit(address: string, role: Role | null) {
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(),
        provideHttpClientTesting(),
        provideRouter([
          { path: 'sign-in', children: [] },
          { path: 'trouble', children: [] },
          {
            path: '',
            canActivate: [signedIn],
            children: [
              { path: '', pathMatch: 'full', canActivate: [toHome], children: [] },
              { path: 'parts/new', canActivate: [withRole('owner', 'fabricator')], children: [] },
              { path: '**', children: [] },
            ],
          },
        ]),
      ],
    });
    const router = TestBed.inject(Router);
    const arrived = router.navigateByUrl(address);
    await new Promise((resolve) => setTimeout(resolve));
    const asked = TestBed.inject(HttpTestingController).expectOne('/api/session');
    if (role === null && address === '/lost') asked.error(new ProgressEvent('error'));
    else asked.flush(session(role));
    await arrived;
    return router;
  }

  it('sends a stranger to sign in, and remembers the address', async () => {
    expect((await visit('/orders', null)).url).toBe('/sign-in?to=%2Forders');
  });

  it.each([
    ['fabricator', '/parts'],
    ['viewer', '/parts'],
    ['customer', '/welcome'],
    ['operator', '/operator'],
  ] as const)('sends a %s home to %s', async (role, home) => {
    expect((await visit('/', role)).url).toBe(home);
  });

  it('keeps a viewer out of what changes parts, without moving the address', async () => {
    const router = await visit('/parts/new', 'viewer');
    expect(router.url).toBe('/not-yours');
    expect(TestBed.inject(Location).path()).not.toContain('not-yours');
  });

  it('owns up to trouble when the session can’t be read', async () => {
    expect((await visit('/lost', null)).url).toBe('/trouble?to=%2Flost');
  });

  it('names only areas that are there for a role', () => {
    expect(areasFor('viewer').map((area) => area.label)).toEqual([
      ...['Parts', 'Materials & tooling', 'Stock & kits', 'Shop', 'Orders', 'Office'],
    ]);
    expect(areasFor('customer').map((area) => area.label)).toEqual(['Your orders']);
    expect(areasFor(null)).toHaveLength(0);
    expect(homeFor(null)).toBe('/welcome');
    expect(initialsOf('Imogen  Rose Harrow')).toBe('IH');
    expect(initialsOf('')).toBe('');
  });
});
