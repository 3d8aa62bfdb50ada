import type { Routes } from '@angular/router';
import { signedIn, toHome, withRole } from './shell/session-guards';

const member = withRole('owner', 'fabricator', 'viewer');
const maker = withRole('owner', 'fabricator');

/** The areas of the application; each is loaded when it is first visited. */
export const routes: Routes = [
  { path: 'sign-in', title: 'Sign in', loadComponent: () => import('./account/sign-in').then((m) => m.SignIn) },
  {
    path: 'sign-up',
    title: 'Start a workshop',
    loadComponent: () => import('./account/sign-up').then((m) => m.SignUp),
  },
  {
    path: 'invitation/:link',
    title: 'Invitation',
    loadComponent: () => import('./account/invitation-page').then((m) => m.InvitationPage),
  },
  {
    path: 'review/:link',
    title: 'Please look at this',
    loadComponent: () => import('./review/review-page').then((m) => m.ReviewPage),
  },
  { path: 'trouble', title: 'Trouble', loadComponent: () => import('./shell/trouble').then((m) => m.Trouble) },
  { path: 'shop', loadChildren: () => import('./storefront/routes').then((m) => m.STOREFRONT_ROUTES) },
  {
    path: '',
    canActivate: [signedIn],
    loadComponent: () => import('./shell/frame').then((m) => m.Frame),
    children: [
      { path: '', pathMatch: 'full', canActivate: [toHome], children: [] },
      {
        path: 'parts',
        canActivate: [member],
        children: [
          {
            path: '',
            pathMatch: 'full',
            title: 'Parts',
            loadComponent: () => import('./parts/parts-page').then((m) => m.PartsPage),
          },
          {
            path: 'new',
            title: 'Start a part',
            canActivate: [maker],
            loadComponent: () => import('./parts/start-part').then((m) => m.StartPart),
          },
          { path: ':partId', loadChildren: () => import('./part/routes').then((m) => m.PART_ROUTES) },
        ],
      },
      {
        path: 'orders',
        canActivate: [member],
        loadChildren: () => import('./orders/routes').then((m) => m.ORDER_ROUTES),
      },
      {
        path: 'materials',
        title: 'Materials & tooling',
        canActivate: [member],
        loadComponent: () => import('./materials/materials-page').then((m) => m.MaterialsPage),
      },
      {
        path: 'stock',
        canActivate: [member],
        loadChildren: () => import('./stock/routes').then((m) => m.STOCK_ROUTES),
      },
      {
        path: 'shop-desk',
        canActivate: [member],
        loadChildren: () => import('./shop-desk/routes').then((m) => m.SHOP_DESK_ROUTES),
      },
      {
        path: 'office',
        title: 'Office',
        canActivate: [member],
        loadComponent: () => import('./office/office-page').then((m) => m.OfficePage),
      },
      {
        path: 'operator',
        title: 'Installation',
        canActivate: [withRole('operator')],
        loadComponent: () => import('./operator/installation-page').then((m) => m.InstallationPage),
      },
      {
        path: 'purchases',
        title: 'Your orders',
        loadComponent: () => import('./storefront/purchases-page').then((m) => m.PurchasesPage),
      },
      { path: 'welcome', title: 'Welcome', loadComponent: () => import('./account/welcome').then((m) => m.Welcome) },
      {
        path: 'account',
        title: 'Your account',
        loadComponent: () => import('./account/account').then((m) => m.Account),
      },
      {
        path: 'not-yours',
        title: 'Not yours',
        loadComponent: () => import('./shell/not-yours').then((m) => m.NotYours),
      },
      { path: '**', title: 'Nothing here', loadComponent: () => import('./shell/not-found').then((m) => m.NotFound) },
    ],
  },
];
