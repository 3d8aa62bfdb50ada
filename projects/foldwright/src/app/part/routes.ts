import { inject } from '@angular/core';
import { type ActivatedRouteSnapshot, type RedirectFunction, Router, type Routes } from '@angular/router';
import { BoardEditor } from './drawing-board/board-editor';
import { ComputedParts } from './computed-parts';
import { PartRoad } from './part-road';
import { PartStore } from './part-store';

const openPart = async (route: ActivatedRouteSnapshot): Promise<true> => {
  const partId = route.paramMap.get('partId');
  if (partId !== null) await inject(PartStore).open(partId);
  return true;
};

/** A part opens where it was left: at the furthest step of its draft, or at the release when it has none. */
const toFurthestStep: RedirectFunction = async ({ params }) => {
  const store = inject(PartStore);
  const router = inject(Router);
  const partId = String(params['partId']);
  await store.open(partId);
  const detail = store.detail();
  const isReleased = detail !== undefined && detail.draft === null && detail.revisions.length > 0;
  const step = isReleased ? 'release' : store.document() === null ? 'mock-up' : store.furthestStep();
  return router.createUrlTree(['/parts', partId, step]);
};

/** The steps of one part, each loaded when it is first visited. */
export const PART_ROUTES: Routes = [
  {
    path: '',
    providers: [PartStore, BoardEditor, ComputedParts, PartRoad],
    children: [
      { path: '', pathMatch: 'full', redirectTo: toFurthestStep },
      {
        path: '',
        loadComponent: () => import('./part-page').then((m) => m.PartPage),
        resolve: { isOpen: openPart },
        children: [
          {
            path: 'mock-up',
            title: 'Mock-up',
            loadComponent: () => import('./mock-up/mock-up-page').then((m) => m.MockUpPage),
          },
          {
            path: 'outline',
            title: 'Outline',
            loadComponent: () => import('./outline/outline-page').then((m) => m.OutlinePage),
          },
          { path: 'bends', title: 'Bends', loadComponent: () => import('./bends/bends-page').then((m) => m.BendsPage) },
          {
            path: 'checks',
            title: 'Checks',
            loadComponent: () => import('./checks/checks-page').then((m) => m.ChecksPage),
          },
          {
            path: 'full-size-print',
            title: 'Full-size print',
            loadComponent: () => import('./full-size-print/print-page').then((m) => m.PrintPage),
          },
          {
            path: 'release',
            title: 'Release',
            loadComponent: () => import('./release/release-page').then((m) => m.ReleasePage),
          },
        ],
      },
    ],
  },
];
