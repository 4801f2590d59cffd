import type { Request } from 'express';
import jwt from 'jsonwebtoken';
import { roleSchema, type Role } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { HttpProblem } from './problem';

/** Who is asking. */
export interface Caller {
  readonly accountId: string;
  readonly sessionId: string;
  readonly email: string;
  readonly name: string;
  readonly roles: readonly Role[];
  readonly team: { readonly id: string; readonly name: string };
}

export const ACCESS_COOKIE = 'tm_access';
export const REFRESH_COOKIE = 'tm_refresh';
export const ACCESS_SECONDS = 10 * 60;
const ISSUER = 'tenthmark';

export function signAccessToken(secret: string, sessionId: string, at: Date): string {
  const iat = Math.floor(at.getTime() / 1000);
  return jwt.sign({ sid: sessionId, iat, exp: iat + ACCESS_SECONDS }, secret, {
    algorithm: 'HS256',
    issuer: ISSUER,
  });
}

export function cookie(request: Request, name: string): string | null {
  const value = (request.cookies as Record<string, unknown> | undefined)?.[name];
  return typeof value === 'string' && value !== '' ? value : null;
}

function sessionOf(token: string, { config, clock }: Dependencies): string | null {
  try {
    const claims = jwt.verify(token, config.secret, {
      algorithms: ['HS256'],
      issuer: ISSUER,
      clockTimestamp: Math.floor(clock().getTime() / 1000),
    });
    const sid = typeof claims === 'object' ? (claims['sid'] as unknown) : null;
    return typeof sid === 'string' ? sid : null;
  } catch {
    // Expired, tampered with or signed with an older secret: all mean "not signed in".
    return null;
  }
}

/**
 * The account behind the access cookie, or null. The session is looked up each time, so that signing out,
 * stopping an account or taking a role away works at once and not when the cookie runs out.
 */
export async function findCaller(request: Request, dependencies: Dependencies): Promise<Caller | null> {
  const token = cookie(request, ACCESS_COOKIE);
  const sessionId = token && sessionOf(token, dependencies);
  if (!sessionId) return null;
  const rows: {
    id: string;
    email: string;
    name: string;
    roles: string[];
    demo: boolean;
    team_id: string;
    team_name: string;
  }[] = await dependencies.db.query(
    `select a.id, a.email, a.name, a.roles, a.demo, t.id as team_id, t.name as team_name
       from sessions s join accounts a on a.id = s.account_id join teams t on t.id = a.team_id
      where s.id = $1 and s.revoked_at is null and a.stopped_at is null`,
    [sessionId],
  );
  const row = rows[0];
  if (!row || (row.demo && !dependencies.config.demo)) return null;
  return {
    accountId: row.id,
    sessionId,
    email: row.email,
    name: row.name,
    roles: roleSchema.array().parse(row.roles),
    team: { id: row.team_id, name: row.team_name },
  };
}

export const sessionExpired = (): HttpProblem => new HttpProblem(401, 'session-expired', 'Sign in to go on.');
