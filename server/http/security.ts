import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import helmet from 'helmet';
import { HttpProblem } from './problem';

/** Headers that tell the browser what the pages may do. Plain http is allowed: the server may stand in a closed lab. */
export function securityHeaders(https: boolean): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      directives: {
        'script-src': ["'self'"],
        // Angular and Plotly set styles from script.
        'style-src': ["'self'", "'unsafe-inline'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'font-src': ["'self'"],
        'worker-src': ["'self'", 'blob:'],
        'connect-src': ["'self'"],
        'frame-ancestors': ["'none'"],
        'upgrade-insecure-requests': https ? [] : null,
      },
    },
    strictTransportSecurity: https,
  });
}

export const requestId: RequestHandler = (_request, response, next) => {
  response.setHeader('x-request-id', randomUUID());
  next();
};

/**
 * A page of another site can make a browser send our cookies, but not this header: SameSite=Strict is one lock,
 * this the second.
 */
export const ownPagesOnly: RequestHandler = (request, _response, next) => {
  const reads = request.method === 'GET' || request.method === 'HEAD';
  if (!reads && request.get('x-tenthmark') !== '1')
    throw new HttpProblem(403, 'foreign-request', 'The request did not come from Tenthmark’s own pages.');
  next();
};

export const neverStored: RequestHandler = (_request, response, next) => {
  response.setHeader('cache-control', 'no-store');
  next();
};
