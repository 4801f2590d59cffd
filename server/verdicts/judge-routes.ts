import { judgeRequestSchema, verdictSchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { judgeCondition } from './judge-service';
import { verdictView } from './verdict-view';

export const judgeRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'post',
    path: '/api/studies/:id/verdicts',
    who: ['analyst'],
    body: judgeRequestSchema,
    answer: verdictSchema,
    handle: async ({ id, body, caller }) => {
      const verdictId = await judgeCondition(id, body, caller, dependencies);
      return verdictView(dependencies.db.manager, verdictId, caller.team.id, caller);
    },
  }),
];
