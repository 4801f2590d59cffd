import { Routes } from '@angular/router';

export default [
  {
    path: '',
    pathMatch: 'full',
    title: 'Bench',
    loadComponent: () => import('./bench-list').then((m) => m.BenchList),
  },
  { path: ':id', title: 'Bench', loadComponent: () => import('./bench-noise').then((m) => m.BenchNoisePage) },
] satisfies Routes;
