import { inject } from '@angular/core';
import { type CanActivateFn, type Routes } from '@angular/router';
import { ApiProblem } from '../api/api-problem';
import { SessionApi } from '../api/session-api';

/** Nobody has to sign in here; the session is read for its token, which every order and question is sent with. */
const withToken: CanActivateFn = async () => {
  try {
    await inject(SessionApi).ensure();
  } catch (error) {
    // The pages say themselves what can't be reached.
    if (!(error instanceof ApiProblem)) throw error;
  }
  return true;
};

/** A workshop's shop, and what is behind the private links it sends. */
export const STOREFRONT_ROUTES: Routes = [
  {
    path: '',
    canActivate: [withToken],
    children: [
      {
        path: 'order/:link',
        title: 'Your order',
        loadComponent: () => import('./customer-order-page').then((m) => m.CustomerOrderPage),
      },
      {
        path: 'question/:link',
        title: 'Your question',
        loadComponent: () => import('./question-page').then((m) => m.QuestionPage),
      },
      { path: ':shop', title: 'Shop', loadComponent: () => import('./front-page').then((m) => m.FrontPage) },
      { path: ':shop/cart', title: 'Cart', loadComponent: () => import('./cart-page').then((m) => m.CartPage) },
      {
        path: ':shop/checkout',
        title: 'Order',
        loadComponent: () => import('./checkout-page').then((m) => m.CheckoutPage),
      },
      { path: ':shop/ask', title: 'Ask us', loadComponent: () => import('./ask-page').then((m) => m.AskPage) },
      {
        path: ':shop/:listing',
        title: 'Shop',
        loadComponent: () => import('./listing-page').then((m) => m.ListingPage),
      },
    ],
  },
];
