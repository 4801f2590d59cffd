import {
  sendBackRequestSchema,
  signOffRequestSchema,
  submitRequestSchema,
  verdictSchema,
  verdictsPageSchema,
  verdictsQuerySchema,
  withdrawRequestSchema,
  type Verdict,
} from '../../shared/contracts';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { route, type Route } from '../http/route';
import { countVerdicts, verdictRows, type VerdictsWanted } from './verdict-rows';
import { takeStep } from './verdict-steps';
import { verdictView } from './verdict-view';

function wanted(query: { state?: string | undefined; studyId?: string | undefined }): VerdictsWanted {
  const values: unknown[] = [];
  const parts = ['true'];
  if (query.state) parts.push(`v.state = $${values.push(query.state) + 1}`);
  if (query.studyId) parts.push(`v.study_id = $${values.push(query.studyId) + 1}`);
  return { where: parts.join(' and '), values };
}

/** A file name of what anyone may type: letters, digits and single hyphens. */
const fileNameOf = ({ study, condition, metric }: Verdict): string =>
  `${[study.name, condition.name, metric].join(' ').replace(/[^\p{L}\p{N}]+/gu, '-')}.json`;

export function verdictRoutes(dependencies: Dependencies): Route[] {
  const { db } = dependencies;
  const view = (id: string, caller: Caller): Promise<Verdict> =>
    verdictView(db.manager, id, caller.team.id, caller);
  return [
    route({
      method: 'get',
      path: '/api/verdicts',
      who: 'any',
      query: verdictsQuerySchema,
      answer: verdictsPageSchema,
      handle: async ({ caller, query: { page, pageSize, ...query } }) => {
        const which = wanted(query);
        const offset = (page - 1) * pageSize;
        const items = await verdictRows(db.manager, caller.team.id, { ...which, limit: pageSize, offset });
        return { items, page, pageSize, total: await countVerdicts(db.manager, caller.team.id, which) };
      },
    }),
    route({
      method: 'get',
      path: '/api/verdicts/:id',
      who: 'any',
      answer: verdictSchema,
      handle: ({ id, caller }) => view(id, caller),
    }),
    route({
      method: 'get',
      path: '/api/verdicts/:id/export',
      who: 'any',
      answer: 'stream',
      handle: async ({ id, caller, response }) => {
        const whole = await view(id, caller);
        const { may: _may, mayNot: _mayNot, ...verdict } = verdictSchema.parse(whole);
        response.attachment(fileNameOf(whole));
        response.type('application/json').send(JSON.stringify(verdict, null, 2));
      },
    }),
    route({
      method: 'post',
      path: '/api/verdicts/:id/submit',
      who: ['analyst'],
      body: submitRequestSchema,
      answer: verdictSchema,
      handle: async ({ id, caller, body }) => {
        await takeStep('submit', id, caller, body, dependencies);
        return view(id, caller);
      },
    }),
    route({
      method: 'post',
      path: '/api/verdicts/:id/sign-off',
      who: ['lead'],
      body: signOffRequestSchema,
      answer: verdictSchema,
      handle: async ({ id, caller, body }) => {
        await takeStep('signOff', id, caller, body, dependencies);
        return view(id, caller);
      },
    }),
    route({
      method: 'post',
      path: '/api/verdicts/:id/send-back',
      who: ['lead'],
      body: sendBackRequestSchema,
      answer: verdictSchema,
      handle: async ({ id, caller, body }) => {
        await takeStep('sendBack', id, caller, body, dependencies);
        return view(id, caller);
      },
    }),
    route({
      method: 'post',
      path: '/api/verdicts/:id/withdraw',
      who: ['lead'],
      body: withdrawRequestSchema,
      answer: verdictSchema,
      handle: async ({ id, caller, body: { reason, replacedBy } }) => {
        await takeStep('withdraw', id, caller, { comment: reason, replacedBy }, dependencies);
        return view(id, caller);
      },
    }),
  ];
}
