import type { Role } from '@foldwright/shared/contracts/route';

/** One area of the application, as the top bar names it. */
export interface Area {
  readonly path: string;
  readonly label: string;
}

const MEMBER_AREAS: readonly Area[] = [
  { path: '/parts', label: 'Parts' },
  { path: '/materials', label: 'Materials & tooling' },
  { path: '/stock', label: 'Stock & kits' },
  { path: '/shop-desk', label: 'Shop' },
  { path: '/orders', label: 'Orders' },
  { path: '/office', label: 'Office' },
];

/** Only the areas that are there for a role. */
export function areasFor(role: Role | null): readonly Area[] {
  switch (role) {
    case 'owner':
    case 'fabricator':
    case 'viewer':
      return MEMBER_AREAS;
    case 'operator':
      return [{ path: '/operator', label: 'Installation' }];
    case 'customer':
      return [{ path: '/purchases', label: 'Your orders' }];
    case null:
      return [];
  }
}

/** Where somebody of a role begins. */
export function homeFor(role: Role | null): string {
  switch (role) {
    case 'owner':
    case 'fabricator':
    case 'viewer':
      return '/parts';
    case 'operator':
      return '/operator';
    case 'customer':
    case null:
      return '/welcome';
  }
}
