import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink, RouterLinkActive } from '@angular/router';

/** The two sides of the audit: verdicts to re-run, and the ledger. */
@Component({
  selector: 'tm-audit-tabs',
  imports: [RouterLink, RouterLinkActive],
  template: `
    <nav aria-label="Audit">
      <a
        routerLink="/audit"
        routerLinkActive
        ariaCurrentWhenActive="page"
        [routerLinkActiveOptions]="{ exact: true }"
        >Verdicts</a
      >
      <a routerLink="/audit/ledger" routerLinkActive ariaCurrentWhenActive="page">Ledger</a>
    </nav>
  `,
  styles: `
    nav {
      display: flex;
      gap: 22px;
      padding-top: 14px;
    }
    a {
      display: inline-flex;
      align-items: center;
      min-height: 28px;
      border-bottom: 3px solid transparent;
      color: var(--ink-2);
      font-weight: 500;
      text-decoration: none;
    }
    a[aria-current] {
      border-color: var(--spirit);
      color: var(--ink);
    }
    @media (pointer: coarse), (max-width: 720px) {
      a {
        min-height: 44px;
      }
    }
    @media print {
      nav {
        display: none;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AuditTabs {}
