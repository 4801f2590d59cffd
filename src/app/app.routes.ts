import { Routes } from '@angular/router';
import { requireNoSession, requireRole, requireSession } from './core/session-guard';

/** Every address of the application. Each feature loads when it is first opened. */
export const routes: Routes = [
  {
    path: 'sign-in',
    title: 'Sign in',
    canActivate: [requireNoSession],
    loadComponent: () => import('./account/sign-in/sign-in').then((m) => m.SignIn),
  },
  {
    path: 'first-run',
    title: 'First administrator',
    canActivate: [requireNoSession],
    loadComponent: () => import('./account/first-run/first-run').then((m) => m.FirstRun),
  },
  {
    path: 'welcome/:token',
    title: 'Choose a password',
    loadComponent: () => import('./account/welcome/welcome').then((m) => m.Welcome),
  },
  {
    path: '',
    canActivate: [requireSession],
    loadComponent: () => import('./core/shell/shell').then((m) => m.Shell),
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Waiting',
        loadComponent: () => import('./studies/waiting/waiting').then((m) => m.WaitingPage),
      },
      { path: 'studies/:id/intake', redirectTo: 'intake/:id' },
      { path: 'studies', loadChildren: () => import('./studies/studies.routes') },
      { path: 'verdicts', loadChildren: () => import('./verdicts/verdicts.routes') },
      {
        path: 'audit',
        canActivate: [requireRole('lead', 'auditor', 'administrator')],
        loadChildren: () => import('./audit/audit.routes'),
      },
      {
        path: 'intake',
        canActivate: [requireRole('analyst')],
        loadChildren: () => import('./intake/intake.routes'),
      },
      { path: 'bench', loadChildren: () => import('./bench/bench.routes') },
      {
        path: 'thresholds',
        title: 'Thresholds',
        canActivate: [requireRole('analyst', 'lead', 'auditor')],
        loadComponent: () => import('./thresholds/thresholds').then((m) => m.ThresholdsPage),
      },
      {
        path: 'people',
        title: 'People',
        canActivate: [requireRole('administrator')],
        loadComponent: () => import('./people/people').then((m) => m.PeoplePage),
      },
      {
        path: 'outbox',
        title: 'Outbox',
        canActivate: [requireRole('administrator')],
        loadComponent: () => import('./people/outbox').then((m) => m.OutboxPage),
      },
      {
        path: 'account',
        title: 'Account',
        loadComponent: () => import('./account/account').then((m) => m.AccountPage),
      },
      {
        path: 'no-access',
        title: 'Not for your role',
        loadComponent: () => import('./core/no-access/no-access').then((m) => m.NoAccess),
      },
      {
        path: '**',
        title: 'Not found',
        loadComponent: () => import('./core/not-found/not-found').then((m) => m.NotFound),
      },
    ],
  },
];
