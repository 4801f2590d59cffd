import { randomUUID } from 'node:crypto';
import type { Response } from 'express';
import { IsNull, LessThan, Not, type EntityManager } from 'typeorm';
import type { Account } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { ACCESS_COOKIE, ACCESS_SECONDS, REFRESH_COOKIE, signAccessToken } from '../http/caller';
import { HttpProblem } from '../http/problem';
import { AccountEntity } from './account-entity';
import { accountView } from './account-view';
import { newToken, passwordMatches, tokenDigest } from './passwords';
import { RefreshTokenEntity, SessionEntity } from './session-entity';

const REFRESH_MILLISECONDS = 14 * 24 * 60 * 60 * 1000;

/** What a browser gets to keep. */
export interface Tokens {
  readonly access: string;
  readonly refresh: string;
}

async function newTokens(
  manager: EntityManager,
  sessionId: string,
  { config, clock }: Dependencies,
): Promise<Tokens> {
  const refresh = newToken();
  const expiresAt = new Date(clock().getTime() + REFRESH_MILLISECONDS);
  await manager.insert(RefreshTokenEntity, {
    digest: tokenDigest(refresh),
    sessionId,
    expiresAt,
    usedAt: null,
  });
  return { access: signAccessToken(config.secret, sessionId, clock()), refresh };
}

/** Begins a session of an account whose right to one has been shown. */
export async function startSession(
  manager: EntityManager,
  accountId: string,
  dependencies: Dependencies,
): Promise<Tokens> {
  const now = dependencies.clock();
  const id = randomUUID();
  await manager.insert(SessionEntity, { id, accountId, startedAt: now, revokedAt: null });
  await manager.update(AccountEntity, accountId, { lastSignInAt: now });
  // Tidies up on the way: tokens that ran out tell nothing any more.
  await manager.delete(RefreshTokenEntity, { expiresAt: LessThan(now) });
  return newTokens(manager, id, dependencies);
}

/** @throws HttpProblem 401 for a wrong address or password alike; 403 for an account that was stopped */
export async function signIn(
  request: { email: string; password: string },
  dependencies: Dependencies,
): Promise<{ account: Account; tokens: Tokens }> {
  const { db, config, passwordCost } = dependencies;
  const found = await db.manager.findOneBy(AccountEntity, { email: request.email });
  const matches = await passwordMatches(request.password, found?.passwordHash ?? null, passwordCost);
  if (!found || !matches)
    throw new HttpProblem(401, 'wrong-credentials', 'The e-mail address or the password is wrong.');
  if (found.stoppedAt)
    throw new HttpProblem(
      403,
      'stopped',
      'This account was stopped. An administrator of the team can open it again.',
    );
  // Their passwords are published: they open nothing on a server that is not a demonstration.
  if (found.demo && !config.demo)
    throw new HttpProblem(403, 'stopped', 'Demonstration accounts are switched off on this server.');
  const tokens = await db.transaction((manager) => startSession(manager, found.id, dependencies));
  return { account: await accountView(db.manager, found.id), tokens };
}

const signedOut = (): HttpProblem => new HttpProblem(401, 'signed-out', 'Sign in to go on.');

/**
 * Trades a refresh token for new tokens. Each may be used once: when an old one turns up again, someone has a copy,
 * and the whole session ends. Two pages of one browser can send the same token at the same moment, though; the later
 * one, which arrived before the first was answered, gets no new refresh token but no punishment either: the browser
 * already holds the new one.
 * @param arrivedAt when the request came in
 */
export async function refreshSession(
  token: string | null,
  arrivedAt: Date,
  dependencies: Dependencies,
): Promise<{ account: Account; access: string; refresh: string | null }> {
  const { db, clock, config } = dependencies;
  if (!token) throw signedOut();
  const outcome = await db.transaction(async (manager) => {
    const known = await manager.findOne(RefreshTokenEntity, {
      where: { digest: tokenDigest(token) },
      lock: { mode: 'pessimistic_write' },
    });
    if (!known) return 'unknown';
    const session = await manager.findOneByOrFail(SessionEntity, { id: known.sessionId });
    if (session.revokedAt) return 'revoked';
    const account = await manager.findOneByOrFail(AccountEntity, { id: session.accountId });
    if (account.stoppedAt || (account.demo && !config.demo) || known.expiresAt <= clock()) return 'unknown';
    if (known.usedAt && known.usedAt < arrivedAt) {
      await manager.update(SessionEntity, session.id, { revokedAt: clock() });
      return 'revoked';
    }
    if (known.usedAt) {
      const access = signAccessToken(config.secret, session.id, clock());
      return { accountId: account.id, access, refresh: null };
    }
    await manager.update(RefreshTokenEntity, known.digest, { usedAt: clock() });
    return { accountId: account.id, ...(await newTokens(manager, session.id, dependencies)) };
  });
  if (outcome === 'unknown') throw signedOut();
  if (outcome === 'revoked')
    throw new HttpProblem(401, 'session-revoked', 'This session was ended for safety. Sign in again.');
  const { accountId, access, refresh } = outcome;
  return { account: await accountView(db.manager, accountId), access, refresh };
}

/** Ends a session by its id or by a refresh token of it; quietly does nothing when there is none. */
export async function endSession(
  { sessionId, refresh }: { sessionId: string | null; refresh: string | null },
  { db, clock }: Dependencies,
): Promise<void> {
  const known = refresh && (await db.manager.findOneBy(RefreshTokenEntity, { digest: tokenDigest(refresh) }));
  const id = sessionId ?? (known ? known.sessionId : null);
  if (id) await db.manager.update(SessionEntity, { id, revokedAt: IsNull() }, { revokedAt: clock() });
}

/** Ends an account's sessions, all or all but one. */
export async function endSessions(
  manager: EntityManager,
  accountId: string,
  at: Date,
  exceptSessionId?: string,
): Promise<void> {
  const others = exceptSessionId ? { id: Not(exceptSessionId) } : {};
  await manager.update(SessionEntity, { accountId, revokedAt: IsNull(), ...others }, { revokedAt: at });
}

export function setCookies(
  response: Response,
  tokens: { access: string; refresh: string | null },
  secure: boolean,
): void {
  const common = { httpOnly: true, sameSite: 'strict', secure } as const;
  response.cookie(ACCESS_COOKIE, tokens.access, { ...common, path: '/api', maxAge: ACCESS_SECONDS * 1000 });
  if (tokens.refresh !== null)
    response.cookie(REFRESH_COOKIE, tokens.refresh, {
      ...common,
      path: '/api/session',
      maxAge: REFRESH_MILLISECONDS,
    });
}

export function clearCookies(response: Response): void {
  response.clearCookie(ACCESS_COOKIE, { path: '/api' });
  response.clearCookie(REFRESH_COOKIE, { path: '/api/session' });
}
