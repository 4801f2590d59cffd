import { outboxSchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { outbox } from './mail-service';

export const mailRoutes = ({ db, post }: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/outbox',
    who: ['administrator'],
    answer: outboxSchema,
    handle: ({ caller }) => outbox(db.manager, caller.team.id, post.mailServer),
  }),
];
