import type { Request } from 'express';
import {
  changePersonRequestSchema,
  invitePersonRequestSchema,
  peopleSchema,
  personSchema,
} from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { changePerson, inviteAgain, invitePerson, people } from './people-service';

/** Where this request reached the server. Used for links only while no PUBLIC_URL is set. */
const addressOf = (request: Request): string => `${request.protocol}://${request.get('host') ?? 'localhost'}`;

export const peopleRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/people',
    who: ['administrator'],
    answer: peopleSchema,
    handle: async ({ caller }) => ({ people: await people(dependencies.db.manager, caller.team.id) }),
  }),
  route({
    method: 'post',
    path: '/api/people',
    who: ['administrator'],
    body: invitePersonRequestSchema,
    answer: personSchema,
    handle: ({ body, caller, request }) => invitePerson(body, caller, addressOf(request), dependencies),
  }),
  route({
    method: 'patch',
    path: '/api/people/:id',
    who: ['administrator'],
    body: changePersonRequestSchema,
    answer: personSchema,
    handle: ({ id, body, caller }) => changePerson(id, body, caller, dependencies),
  }),
  route({
    method: 'post',
    path: '/api/people/:id/invite',
    who: ['administrator'],
    answer: 'nothing',
    handle: ({ id, caller, request }) => inviteAgain(id, caller, addressOf(request), dependencies),
  }),
];
