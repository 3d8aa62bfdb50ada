import type { Routes } from '@angular/router';

/** What lies on the shelf, what goes with it, and what is made of both. */
export const STOCK_ROUTES: Routes = [
  {
    path: '',
    loadComponent: () => import('./stock-area').then((m) => m.StockArea),
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Shelf',
        loadComponent: () => import('./shelf-page').then((m) => m.ShelfPage),
      },
      {
        path: 'hardware',
        title: 'Hardware',
        loadComponent: () => import('./hardware-page').then((m) => m.HardwarePage),
      },
      { path: 'kits', title: 'Kits', loadComponent: () => import('./kits-page').then((m) => m.KitsPage) },
      { path: 'kits/:kitId', title: 'Kit', loadComponent: () => import('./kit-page').then((m) => m.KitPage) },
      { path: 'earnings', title: 'Costs', loadComponent: () => import('./earnings-page').then((m) => m.EarningsPage) },
    ],
  },
];
