import { inject } from '@angular/core';
import { type CanActivateFn, RedirectCommand, Router, type Routes } from '@angular/router';
import { SessionApi } from '../api/session-api';

/** The books are for owners. */
const owner: CanActivateFn = () =>
  inject(SessionApi).role() === 'owner' ||
  new RedirectCommand(inject(Router).parseUrl('/not-yours'), { skipLocationChange: true });

/** The workshop's side of its shop. */
export const SHOP_DESK_ROUTES: Routes = [
  {
    path: '',
    loadComponent: () => import('./shop-area').then((m) => m.ShopArea),
    children: [
      { path: '', pathMatch: 'full', redirectTo: 'sales' },
      { path: 'sales', title: 'Sales', loadComponent: () => import('./sales-page').then((m) => m.SalesPage) },
      { path: 'sales/:saleId', title: 'Sale', loadComponent: () => import('./sale-page').then((m) => m.SalePage) },
      {
        path: 'listings',
        title: 'Listings',
        loadComponent: () => import('./listings-page').then((m) => m.ListingsPage),
      },
      {
        path: 'listings/:listingId',
        title: 'Listing',
        loadComponent: () => import('./listing-editor').then((m) => m.ListingEditor),
      },
      {
        path: 'questions',
        title: 'Questions',
        loadComponent: () => import('./questions-page').then((m) => m.QuestionsPage),
      },
      {
        path: 'books',
        title: 'Books',
        canActivate: [owner],
        loadComponent: () => import('./books-page').then((m) => m.BooksPage),
      },
      {
        path: 'settings',
        title: 'Shop settings',
        canActivate: [owner],
        loadComponent: () => import('./settings-page').then((m) => m.SettingsPage),
      },
    ],
  },
];
