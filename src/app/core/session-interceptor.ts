import { HttpBackend, HttpClient, HttpErrorResponse, HttpInterceptorFn } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { catchError, Observable, shareReplay, switchMap, throwError } from 'rxjs';
import { problemSchema } from '../../../shared/contracts/common';

/** Renews an expired session once for all requests that ran into it together. */
@Injectable({ providedIn: 'root' })
class SessionRenewal {
  // Past the interceptors: a failed renewal must not ask for another.
  private readonly http = new HttpClient(inject(HttpBackend));
  private under: Observable<unknown> | null = null;

  once(): Observable<unknown> {
    this.under ??= this.http
      .post('/api/session/refresh', {}, { headers: { 'x-tenthmark': '1' } })
      .pipe(shareReplay(1));
    const current = this.under;
    current.subscribe({ error: () => (this.under = null), complete: () => (this.under = null) });
    return current;
  }
}

const isExpired = (error: unknown): boolean =>
  error instanceof HttpErrorResponse &&
  error.status === 401 &&
  problemSchema.safeParse(error.error).data?.code === 'session-expired';

/** A short session that ran out is renewed and the request repeated, so nobody loses what they were doing. */
export const sessionInterceptor: HttpInterceptorFn = (request, next) => {
  const renewal = inject(SessionRenewal);
  return next(request).pipe(
    catchError((error: unknown) =>
      isExpired(error)
        ? renewal.once().pipe(
            catchError(() => throwError(() => error)),
            switchMap(() => next(request)),
          )
        : throwError(() => error),
    ),
  );
};
