import { Routes } from '@angular/router';

/** `/verdicts/:id`; `?pair=2` shows another pair of more than two coolers. */
const routes: Routes = [
  {
    path: ':id',
    title: 'Verdict',
    loadComponent: () => import('./verdict-page').then((m) => m.VerdictPage),
  },
];

export default routes;
