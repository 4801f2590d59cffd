import { inject, Injectable } from '@angular/core';
import { EMPTY, expand, map, Observable, reduce } from 'rxjs';
import {
  LedgerCheck,
  ledgerCheckSchema,
  LedgerEntry,
  LedgerPage,
  ledgerPageSchema,
} from '../../../shared/contracts/ledger';
import { ReRun, VerdictRow } from '../../../shared/contracts/verdicts';
import { Api } from '../core/api';
import { VerdictsClient } from '../verdicts/verdicts-client';

/** Most entries the server gives at once. */
const PAGE = 200;

interface PageOf<T> {
  readonly items: readonly T[];
  readonly page: number;
  readonly pageSize: number;
  readonly total: number;
}

/** What an auditor reads: verdicts that were submitted or signed off, and the ledger. */
@Injectable({ providedIn: 'root' })
export class AuditClient {
  private readonly api = inject(Api);
  private readonly client = inject(VerdictsClient);

  /** Every verdict in a state, newest first, fetched page by page. */
  verdicts(state: 'signed off' | 'submitted'): Observable<VerdictRow[]> {
    return allPages((page) => this.client.page({ state, page, pageSize: PAGE }));
  }

  reRun(id: string): Observable<ReRun> {
    return this.client.reRun(id);
  }

  ledger(page: number, pageSize: number): Observable<LedgerPage> {
    return this.api.get('/ledger', ledgerPageSchema, { page, pageSize });
  }

  /** The whole ledger, oldest entry first, as it is taken away. */
  wholeLedger(): Observable<LedgerEntry[]> {
    return allPages((page) => this.ledger(page, PAGE)).pipe(
      map((entries) => entries.sort((one, other) => one.number - other.number)),
    );
  }

  check(): Observable<LedgerCheck> {
    return this.api.get('/ledger/check', ledgerCheckSchema);
  }
}

/** Asks for page after page until all items are there. */
export function allPages<T>(fetch: (page: number) => Observable<PageOf<T>>): Observable<T[]> {
  return fetch(1).pipe(
    expand(({ page, pageSize, total, items }) =>
      page * pageSize < total && items.length > 0 ? fetch(page + 1) : EMPTY,
    ),
    reduce((all: T[], { items }) => [...all, ...items], []),
  );
}
