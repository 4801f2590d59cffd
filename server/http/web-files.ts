import { existsSync } from 'node:fs';
import { join } from 'node:path';
import express, { type RequestHandler, type Router } from 'express';
import { HttpProblem } from './problem';

/** The build puts a hash of the content into such names, so what is behind them never changes. */
const HASHED = /[-.][A-Z0-9]{8,}\.[a-z0-9]+$/;

/** The built Angular application: its files, and index.html for every page address that is not a file. */
export function webFiles(folder: string, router: Router): void {
  router.use(
    express.static(folder, {
      index: false,
      redirect: false,
      setHeaders: (response, path) => {
        response.setHeader(
          'cache-control',
          HASHED.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache',
        );
      },
    }),
  );
  const page: RequestHandler = (request, response) => {
    const index = join(folder, 'index.html');
    // A missing file is missing; only addresses of pages lead to the application.
    if (/\.[a-z0-9]{2,5}$/i.test(request.path))
      throw new HttpProblem(404, 'not-found', 'There is no such file.');
    if (!existsSync(index))
      throw new HttpProblem(503, 'not-built', 'The web application is not built. Run: npm run build.');
    response.setHeader('cache-control', 'no-cache');
    response.sendFile(index);
  };
  router.get(/^\/(?!api(\/|$)).*/, page);
}
