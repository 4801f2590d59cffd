import { inject, Injectable } from '@angular/core';
import { Observable } from 'rxjs';
import {
  ReRun,
  reRunSchema,
  Verdict,
  verdictSchema,
  VerdictsPage,
  verdictsPageSchema,
  VerdictState,
} from '../../../shared/contracts/verdicts';
import { Api } from '../core/api';

/** The verdicts of the team and the acts on them. */
@Injectable({ providedIn: 'root' })
export class VerdictsClient {
  private readonly api = inject(Api);

  get(id: string): Observable<Verdict> {
    return this.api.get(`/verdicts/${id}`, verdictSchema);
  }

  page(query: {
    state?: VerdictState;
    studyId?: string;
    page?: number;
    pageSize?: number;
  }): Observable<VerdictsPage> {
    return this.api.get('/verdicts', verdictsPageSchema, query);
  }

  submit(id: string, comment: string | null): Observable<Verdict> {
    return this.api.post(`/verdicts/${id}/submit`, { comment }, verdictSchema);
  }

  signOff(id: string, comment: string | null): Observable<Verdict> {
    return this.api.post(`/verdicts/${id}/sign-off`, { comment }, verdictSchema);
  }

  sendBack(id: string, comment: string): Observable<Verdict> {
    return this.api.post(`/verdicts/${id}/send-back`, { comment }, verdictSchema);
  }

  withdraw(id: string, reason: string, replacedBy: string | null): Observable<Verdict> {
    return this.api.post(`/verdicts/${id}/withdraw`, { reason, replacedBy }, verdictSchema);
  }

  /** Recomputes the verdict from its stored raw files; the result is kept in the ledger. */
  reRun(id: string): Observable<ReRun> {
    return this.api.post(`/verdicts/${id}/re-run`, {}, reRunSchema);
  }
}

/** Where the whole verdict downloads from: input, judgement and the digests of its logs. */
export function exportAddress(id: string): string {
  return `/api/verdicts/${id}/export`;
}

/** Where a run's log downloads from, byte for byte as it was brought in. */
export function logAddress(runId: string): string {
  return `/api/runs/${runId}/log`;
}
