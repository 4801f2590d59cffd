import { inject } from '@angular/core';
import { CanActivateFn, Router, UrlTree } from '@angular/router';
import { Role } from '../../../shared/contracts/common';
import { Session } from './session';

const enter = (router: Router, session: Session, to: string): UrlTree =>
  session.state() === 'first run'
    ? router.createUrlTree(['/first-run'])
    : router.createUrlTree(['/sign-in'], { queryParams: to === '/' ? {} : { to } });

/** Lets signed-in people through; others sign in first and come back. */
export const requireSession: CanActivateFn = async (_route, { url }) => {
  const session = inject(Session);
  const router = inject(Router);
  await session.known();
  return session.account() ? true : enter(router, session, url);
};

/** Lets people with one of `roles` through; others learn who can use the place. */
export const requireRole =
  (...roles: readonly Role[]): CanActivateFn =>
  () => {
    const session = inject(Session);
    return session.has(...roles)
      ? true
      : inject(Router).createUrlTree(['/no-access'], { queryParams: { for: roles.join(',') } });
  };

/** Sign-in and first run are for people who are not in yet. */
export const requireNoSession: CanActivateFn = async (route) => {
  const session = inject(Session);
  const router = inject(Router);
  await session.known();
  if (session.account()) return router.createUrlTree(['/']);
  const firstRun = route.routeConfig?.path === 'first-run';
  return firstRun === (session.state() === 'first run') ? true : enter(router, session, '/');
};
