import { Routes } from '@angular/router';
import { leaveWithUnsentLogs } from './leave-guard';

export default [
  {
    path: '',
    pathMatch: 'full',
    title: 'Intake',
    loadComponent: () => import('./study-choice/study-choice').then((m) => m.StudyChoice),
  },
  {
    path: ':id',
    title: 'Bring in runs',
    canDeactivate: [leaveWithUnsentLogs],
    loadComponent: () => import('./intake-page').then((m) => m.IntakePage),
  },
] satisfies Routes;
