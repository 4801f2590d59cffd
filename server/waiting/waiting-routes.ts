import { waitingSchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { waitingFor } from './waiting-service';

export const waitingRoutes = ({ db, clock }: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/waiting',
    who: 'any',
    answer: waitingSchema,
    handle: ({ caller }) => waitingFor(db.manager, caller, clock()),
  }),
];
