import type { RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import type { Limits } from '../dependencies';
import { HttpProblem } from './problem';

function failures(
  limits: Limits,
  limit: number,
  key: (address: string, body: unknown) => string,
): RequestHandler {
  return rateLimit({
    windowMs: limits.windowMilliseconds,
    limit,
    skipSuccessfulRequests: true,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: (request) => key(ipKeyGenerator(request.ip ?? ''), request.body),
    handler: (_request, _response, next) => {
      const minutes = Math.ceil(limits.windowMilliseconds / 60_000);
      next(
        new HttpProblem(429, 'too-many-tries', 'Too many tries.', {
          detail: `Wait up to ${minutes} min, then try again.`,
        }),
      );
    },
  });
}

/** Failed tries only: whoever signs in properly is never held up by this. */
export const failuresPerAddress = (limits: Limits): RequestHandler =>
  failures(limits, limits.failuresPerAddress, (address) => address);

/** Failed tries for one e-mail address, so that guessing one password from many addresses is slow as well. */
export const failuresPerAccount = (limits: Limits): RequestHandler =>
  failures(limits, limits.failuresPerAccount, (_address, body) => {
    const email = (body as { email?: unknown } | undefined)?.email;
    return typeof email === 'string' ? email.trim().toLowerCase() : '';
  });
