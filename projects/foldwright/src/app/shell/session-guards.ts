import { inject } from '@angular/core';
import { type CanActivateFn, RedirectCommand, Router } from '@angular/router';
import type { Role } from '@foldwright/shared/contracts/route';
import { ApiProblem } from '../api/api-problem';
import { SessionApi } from '../api/session-api';
import { homeFor } from './areas';

/** Lets in who is signed in; others sign in first and come back to where they wanted to go. */
export const signedIn: CanActivateFn = async (_route, state) => {
  const [session, router] = [inject(SessionApi), inject(Router)];
  try {
    const known = await session.ensure();
    return known.user !== null || router.createUrlTree(['/sign-in'], { queryParams: { to: state.url } });
  } catch (error) {
    if (!(error instanceof ApiProblem)) throw error;
    // Without a session nothing can be shown; the page of trouble says so and tries again at the same address.
    return new RedirectCommand(router.createUrlTree(['/trouble'], { queryParams: { to: state.url } }));
  }
};

/** Sends everybody to the area they begin in. */
export const toHome: CanActivateFn = () => {
  const [session, router] = [inject(SessionApi), inject(Router)];
  return router.parseUrl(homeFor(session.role()));
};

/** Lets in who has one of the roles; others see a page that says whose it is. */
export function withRole(...roles: readonly Role[]): CanActivateFn {
  return () => {
    const [session, router] = [inject(SessionApi), inject(Router)];
    const role = session.role();
    if (role !== null && roles.includes(role)) return true;
    return new RedirectCommand(router.parseUrl('/not-yours'), { skipLocationChange: true });
  };
}
