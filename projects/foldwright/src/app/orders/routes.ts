import type { Routes } from '@angular/router';

/** Orders to the cutting service: the list and one order. */
export const ORDER_ROUTES: Routes = [
  { path: '', title: 'Orders', loadComponent: () => import('./orders-page').then((m) => m.OrdersPage) },
  { path: ':orderId', title: 'Order', loadComponent: () => import('./order-page').then((m) => m.OrderPage) },
];
