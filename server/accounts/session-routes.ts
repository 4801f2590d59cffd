import type { Request } from 'express';
import { z } from 'zod';
import {
  acceptInvitationRequestSchema,
  accountSchema,
  changePasswordRequestSchema,
  firstRunRequestSchema,
  sessionSchema,
  signInRequestSchema,
  type Session,
} from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { cookie, findCaller, REFRESH_COOKIE } from '../http/caller';
import { failuresPerAccount, failuresPerAddress } from '../http/limits';
import { HttpProblem } from '../http/problem';
import { route, type Route } from '../http/route';
import { AccountEntity } from './account-entity';
import { accountView } from './account-view';
import { demoSignIns } from './demo-sign-ins';
import { firstRun } from './first-run';
import { acceptInvitation, changePassword } from './password-service';
import { clearCookies, endSession, refreshSession, setCookies, signIn } from './session-service';

const signedInSchema = z.object({ account: accountSchema });

async function session(request: Request, dependencies: Dependencies): Promise<Session> {
  const { manager } = dependencies.db;
  const caller = await findCaller(request, dependencies);
  if (caller) return { state: 'signed in', account: await accountView(manager, caller.accountId) };
  if (!(await manager.exists(AccountEntity))) return { state: 'first run' };
  return { state: 'signed out', demo: await demoSignIns(dependencies) };
}

export function sessionRoutes(dependencies: Dependencies): Route[] {
  const { config, limits, clock } = dependencies;
  const isSecure = (request: Request): boolean =>
    request.secure || (config.publicUrl?.startsWith('https:') ?? false);
  const perAddress = failuresPerAddress(limits);
  return [
    route({
      method: 'get',
      path: '/api/session',
      who: 'public',
      answer: sessionSchema,
      handle: ({ request }) => session(request, dependencies),
    }),
    route({
      method: 'post',
      path: '/api/session',
      who: 'public',
      before: [perAddress, failuresPerAccount(limits)],
      body: signInRequestSchema,
      answer: signedInSchema,
      handle: async ({ body, request, response }) => {
        const { account, tokens } = await signIn(body, dependencies);
        setCookies(response, tokens, isSecure(request));
        return { account };
      },
    }),
    route({
      method: 'post',
      path: '/api/session/refresh',
      who: 'public',
      answer: signedInSchema,
      handle: async ({ request, response }) => {
        const arrivedAt = clock();
        try {
          const refreshed = await refreshSession(cookie(request, REFRESH_COOKIE), arrivedAt, dependencies);
          setCookies(response, refreshed, isSecure(request));
          return { account: refreshed.account };
        } catch (error) {
          if (error instanceof HttpProblem) clearCookies(response);
          throw error;
        }
      },
    }),
    route({
      method: 'delete',
      path: '/api/session',
      who: 'public',
      answer: 'nothing',
      handle: async ({ request, response }) => {
        const caller = await findCaller(request, dependencies);
        const refresh = cookie(request, REFRESH_COOKIE);
        await endSession({ sessionId: caller?.sessionId ?? null, refresh }, dependencies);
        clearCookies(response);
      },
    }),
    route({
      method: 'post',
      path: '/api/first-run',
      who: 'public',
      body: firstRunRequestSchema,
      answer: signedInSchema,
      handle: async ({ body, request, response }) => {
        const { account, tokens } = await firstRun(body, dependencies);
        setCookies(response, tokens, isSecure(request));
        return { account };
      },
    }),
    route({
      method: 'post',
      path: '/api/invitations/accept',
      who: 'public',
      before: [perAddress],
      body: acceptInvitationRequestSchema,
      answer: signedInSchema,
      handle: async ({ body, request, response }) => {
        const { account, tokens } = await acceptInvitation(body, dependencies);
        setCookies(response, tokens, isSecure(request));
        return { account };
      },
    }),
    route({
      method: 'put',
      path: '/api/account/password',
      who: 'any',
      body: changePasswordRequestSchema,
      answer: 'nothing',
      handle: ({ body, caller }) => changePassword(body, caller, dependencies),
    }),
  ];
}
