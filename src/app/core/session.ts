import { computed, inject, Injectable, signal } from '@angular/core';
import { catchError, firstValueFrom, map, Observable, of, switchMap, tap } from 'rxjs';
import * as z from 'zod';
import {
  AcceptInvitationRequest,
  Account,
  accountSchema,
  FirstRunRequest,
  Session as SessionAnswer,
  sessionSchema,
  SignInRequest,
} from '../../../shared/contracts/accounts';
import { Role } from '../../../shared/contracts/common';
import { Api } from './api';

const signedInAnswer = z.object({ account: accountSchema });

/** Tells that this browser was signed in, so that a fresh page does not ask to renew a session that never was. */
const BEEN_IN = 'tenthmark.been-in';

type DemoSignIn = Extract<SessionAnswer, { state: 'signed out' }>['demo'][number];

/**
 * Who is here. States: unknown until the server was asked once; then signed out, signed in, or first run
 * (no administrator exists yet). A failed renewal ends the session; no answer leaves it as it was.
 */
@Injectable({ providedIn: 'root' })
export class Session {
  private readonly api = inject(Api);
  private readonly answer = signal<SessionAnswer | null>(null);

  readonly state = computed(() => this.answer()?.state ?? 'unknown');
  readonly account = computed<Account | null>(() => {
    const answer = this.answer();
    return answer?.state === 'signed in' ? answer.account : null;
  });
  readonly roles = computed<readonly Role[]>(() => this.account()?.roles ?? []);
  readonly demo = computed<readonly DemoSignIn[]>(() => {
    const answer = this.answer();
    return answer?.state === 'signed out' ? answer.demo : [];
  });

  has(...roles: readonly Role[]): boolean {
    return this.roles().some((role) => roles.includes(role));
  }

  /** Asks the server once who is here, renewing an expired session first when there is one. */
  async known(): Promise<void> {
    if (this.answer()) return;
    await firstValueFrom(
      this.ask().pipe(
        switchMap((answer) =>
          answer.state === 'signed out' && wasIn()
            ? this.renew().pipe(switchMap((renewed) => (renewed ? this.ask() : of(answer))))
            : of(answer),
        ),
        tap((answer) => this.answer.set(answer)),
      ),
    );
  }

  /** Trades the refresh cookie for a new session; `false` when there is none to renew. */
  renew(): Observable<boolean> {
    return this.api.post('/session/refresh', {}, z.unknown()).pipe(
      map(() => true),
      catchError(() => of(false)),
    );
  }

  signIn(request: SignInRequest): Observable<Account> {
    return this.enter('/session', request);
  }

  firstRun(request: FirstRunRequest): Observable<Account> {
    return this.enter('/first-run', request);
  }

  acceptInvitation(request: AcceptInvitationRequest): Observable<Account> {
    return this.enter('/invitations/accept', request);
  }

  signOut(): Observable<void> {
    return this.api.delete('/session', z.unknown()).pipe(map(() => this.ended()));
  }

  /** Forgets who was here; the next page asks again. */
  ended(): void {
    remember(false);
    this.answer.set(null);
  }

  private enter(path: string, request: unknown): Observable<Account> {
    return this.api.post(path, request, signedInAnswer).pipe(
      map(({ account }) => account),
      tap((account) => {
        remember(true);
        this.answer.set({ state: 'signed in', account });
      }),
    );
  }

  private ask(): Observable<SessionAnswer> {
    return this.api.get('/session', sessionSchema);
  }
}

// Storage can be closed to us; a page then asks the server, which is only slower.
function wasIn(): boolean {
  try {
    return localStorage.getItem(BEEN_IN) !== null;
  } catch {
    return true;
  }
}

function remember(isIn: boolean): void {
  try {
    if (isIn) localStorage.setItem(BEEN_IN, '1');
    else localStorage.removeItem(BEEN_IN);
  } catch {
    // As above.
  }
}
