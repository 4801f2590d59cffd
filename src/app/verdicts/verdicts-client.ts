import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { map, Observable } from 'rxjs';
import { z } from 'zod';
import {
  ReRun,
  reRunSchema,
  Verdict,
  verdictSchema,
  VerdictsPage,
  verdictsPageSchema,
  VerdictState,
} from '../../../shared/contracts';

export interface VerdictsQuery {
  readonly state?: VerdictState;
  readonly studyId?: string;
  readonly page?: number;
  readonly pageSize?: number;
}

/** The verdicts of the team. Every answer is parsed by its contract before it has a type. */
@Injectable({ providedIn: 'root' })
export class VerdictsClient {
  private readonly http = inject(HttpClient);

  get(id: string): Observable<Verdict> {
    return this.http.get<unknown>(address(id)).pipe(map(parsed(verdictSchema)));
  }

  list(query: VerdictsQuery): Observable<VerdictsPage> {
    const params = new HttpParams({ fromObject: { ...query } });
    return this.http.get<unknown>('/api/verdicts', { params }).pipe(map(parsed(verdictsPageSchema)));
  }

  submit(id: string, comment: string | null): Observable<Verdict> {
    return this.act(id, 'submit', { comment });
  }

  signOff(id: string, comment: string | null): Observable<Verdict> {
    return this.act(id, 'sign-off', { comment });
  }

  sendBack(id: string, comment: string): Observable<Verdict> {
    return this.act(id, 'send-back', { comment });
  }

  withdraw(id: string, reason: string, replacedBy: string | null): Observable<Verdict> {
    return this.act(id, 'withdraw', { reason, replacedBy });
  }

  /** Recomputes the verdict from its stored raw files; the result is kept in the ledger. */
  reRun(id: string): Observable<ReRun> {
    return this.http.post<unknown>(`${address(id)}/re-run`, {}).pipe(map(parsed(reRunSchema)));
  }

  private act(id: string, act: string, body: object): Observable<Verdict> {
    return this.http.post<unknown>(`${address(id)}/${act}`, body).pipe(map(parsed(verdictSchema)));
  }
}

/** Where the whole verdict downloads from: input, judgement and the digests of its logs. */
export function exportAddress(id: string): string {
  return `${address(id)}/export`;
}

/** Where a run's log downloads from, byte for byte as it was brought in. */
export function logAddress(runId: string): string {
  return `/api/runs/${encodeURIComponent(runId)}/log`;
}

function address(id: string): string {
  return `/api/verdicts/${encodeURIComponent(id)}`;
}

function parsed<T>(schema: z.ZodType<T>): (body: unknown) => T {
  return (body) => schema.parse(body);
}
