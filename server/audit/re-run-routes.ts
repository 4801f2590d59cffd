import { reRunSchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { reRunVerdict } from './re-run-service';

export const reRunRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'post',
    path: '/api/verdicts/:id/re-run',
    who: ['auditor', 'lead'],
    answer: reRunSchema,
    handle: ({ id, caller, role }) => reRunVerdict(id, caller, role ?? 'auditor', dependencies),
  }),
];
