import {
  addBenchRequestSchema,
  addCoolerRequestSchema,
  benchesSchema,
  benchNoiseSchema,
  benchSchema,
  coolerSchema,
  coolersSchema,
} from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { addBench, addCooler, benches, coolers } from './bench-service';
import { benchNoise } from './noise-service';

export const benchRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/benches',
    who: 'any',
    answer: benchesSchema,
    handle: async ({ caller }) => ({ benches: await benches(dependencies.db.manager, caller.team.id) }),
  }),
  route({
    method: 'post',
    path: '/api/benches',
    who: ['administrator'],
    body: addBenchRequestSchema,
    answer: benchSchema,
    handle: ({ caller, body }) => addBench(body, caller, dependencies),
  }),
  route({
    method: 'get',
    path: '/api/benches/:id/noise',
    who: 'any',
    answer: benchNoiseSchema,
    handle: ({ caller, id }) => benchNoise(dependencies.db.manager, id, caller.team.id),
  }),
  route({
    method: 'get',
    path: '/api/coolers',
    who: 'any',
    answer: coolersSchema,
    handle: async ({ caller }) => ({ coolers: await coolers(dependencies.db.manager, caller.team.id) }),
  }),
  route({
    method: 'post',
    path: '/api/coolers',
    who: ['analyst', 'lead'],
    body: addCoolerRequestSchema,
    answer: coolerSchema,
    handle: ({ caller, body }) => addCooler(body, caller, dependencies),
  }),
];
