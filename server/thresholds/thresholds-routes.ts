import { changeThresholdsRequestSchema, thresholdsHistorySchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { changeThresholds, thresholdsHistory } from './thresholds-service';

export const thresholdsRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/thresholds',
    who: 'any',
    answer: thresholdsHistorySchema,
    handle: ({ caller }) => thresholdsHistory(dependencies.db.manager, caller.team.id),
  }),
  route({
    method: 'post',
    path: '/api/thresholds',
    who: ['lead'],
    body: changeThresholdsRequestSchema,
    answer: thresholdsHistorySchema,
    handle: ({ caller, body }) => changeThresholds(dependencies, caller, body),
  }),
];
