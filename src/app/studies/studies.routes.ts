import { Routes } from '@angular/router';
import { requireRole } from '../core/session-guard';

export default [
  {
    path: '',
    pathMatch: 'full',
    title: 'Studies',
    loadComponent: () => import('./study-list/study-list').then((m) => m.StudyList),
  },
  {
    path: 'new',
    title: 'New study',
    canActivate: [requireRole('analyst')],
    loadComponent: () => import('./new-study/new-study').then((m) => m.NewStudy),
  },
  { path: ':id', title: 'Study', loadComponent: () => import('./study/study').then((m) => m.StudyPage) },
] satisfies Routes;
