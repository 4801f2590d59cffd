import {
  addStudyRequestSchema,
  studiesPageSchema,
  studiesQuerySchema,
  studySchema,
} from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { addStudy } from './study-service';
import { studiesPage, studyView } from './study-view';

export const studyRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/studies',
    who: 'any',
    query: studiesQuerySchema,
    answer: studiesPageSchema,
    handle: ({ caller, query }) => studiesPage(dependencies.db.manager, caller.team.id, query),
  }),
  route({
    method: 'post',
    path: '/api/studies',
    who: ['analyst'],
    body: addStudyRequestSchema,
    answer: studySchema,
    handle: ({ caller, body }) => addStudy(body, caller, dependencies),
  }),
  route({
    method: 'get',
    path: '/api/studies/:id',
    who: 'any',
    answer: studySchema,
    handle: ({ caller, id }) => studyView(dependencies.db.manager, id, caller.team.id),
  }),
];
