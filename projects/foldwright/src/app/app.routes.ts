import type { Routes } from '@angular/router';

/** The areas of the application; each is loaded when it is first visited. */
export const routes: Routes = [];
