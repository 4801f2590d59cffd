import { ledgerCheckSchema, ledgerPageSchema, pageQuerySchema } from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import { route, type Route } from '../http/route';
import { checkLedger, ledgerPage } from './ledger-service';

export const ledgerRoutes = ({ db, clock }: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/ledger',
    who: ['auditor', 'lead', 'administrator'],
    query: pageQuerySchema,
    answer: ledgerPageSchema,
    handle: ({ caller, query }) => ledgerPage(db.manager, caller.team.id, query),
  }),
  route({
    method: 'get',
    path: '/api/ledger/check',
    who: ['auditor', 'lead', 'administrator'],
    answer: ledgerCheckSchema,
    handle: ({ caller }) => checkLedger(db.manager, caller.team.id, clock()),
  }),
];
