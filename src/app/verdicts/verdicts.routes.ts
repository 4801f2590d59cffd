import { Routes } from '@angular/router';

/** `/verdicts/:id`; `?pair=2` shows another pair of more than two coolers. */
const routes: Routes = [
  { path: ':id', loadComponent: () => import('./verdict-page').then(({ VerdictPage }) => VerdictPage) },
];

export default routes;
