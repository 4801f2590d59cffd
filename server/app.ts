import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import { z } from 'zod';
import { peopleRoutes } from './accounts/people-routes';
import { sessionRoutes } from './accounts/session-routes';
import { ledgerRoutes } from './audit/ledger-routes';
import { benchRoutes } from './benches/bench-routes';
import { reRunRoutes } from './audit/re-run-routes';
import type { Dependencies } from './dependencies';
import { problemHandler, unknownApiPath } from './http/problem';
import { mount, route, type Route } from './http/route';
import { neverStored, ownPagesOnly, requestId, securityHeaders } from './http/security';
import { webFiles } from './http/web-files';
import { mailRoutes } from './mail/mail-routes';
import { runRoutes } from './runs/run-routes';
import { studyRoutes } from './studies/study-routes';
import { thresholdsRoutes } from './thresholds/thresholds-routes';
import { judgeRoutes } from './verdicts/judge-routes';
import { verdictRoutes } from './verdicts/verdict-routes';
import { waitingRoutes } from './waiting/waiting-routes';

const healthRoutes = (): Route[] => [
  route({
    method: 'get',
    path: '/api/health',
    who: 'public',
    answer: z.object({ ok: z.literal(true) }),
    handle: () => Promise.resolve({ ok: true as const }),
  }),
];

/** Every route of the server, each with who may call it. What is not here is not there. */
export const apiRoutes = (dependencies: Dependencies): Route[] => [
  ...healthRoutes(),
  ...sessionRoutes(dependencies),
  ...peopleRoutes(dependencies),
  ...mailRoutes(dependencies),
  ...thresholdsRoutes(dependencies),
  ...benchRoutes(dependencies),
  ...studyRoutes(dependencies),
  ...runRoutes(dependencies),
  ...judgeRoutes(dependencies),
  ...verdictRoutes(dependencies),
  ...reRunRoutes(dependencies),
  ...waitingRoutes(dependencies),
  ...ledgerRoutes(dependencies),
];

/** The whole application, ready to listen; `routes` tells the tests what there is to try. */
export function createApp(dependencies: Dependencies): { app: Express; routes: readonly Route[] } {
  const { config, report } = dependencies;
  const routes = apiRoutes(dependencies);
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.trustProxy);
  app.use(requestId, securityHeaders(config.publicUrl?.startsWith('https:') ?? false));

  const api = express.Router({ caseSensitive: true, strict: true });
  api.use(neverStored, ownPagesOnly, cookieParser());
  mount(api, routes, dependencies);
  api.use(unknownApiPath);
  app.use('/api', api);

  webFiles(dependencies.webFolder, app);
  app.use((request) => unknownApiPath(request, undefined as never, undefined as never));
  app.use(problemHandler(report));
  return { app, routes };
}
