import { Routes } from '@angular/router';

/** `/audit`: verdicts and their re-runs; `/audit/ledger`: the chained record. */
const routes: Routes = [
  { path: '', title: 'Audit', loadComponent: () => import('./audit-page').then((m) => m.AuditPage) },
  { path: 'ledger', title: 'Ledger', loadComponent: () => import('./ledger-page').then((m) => m.LedgerPage) },
];

export default routes;
