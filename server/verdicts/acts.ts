import type { Judgement, Role, VerdictState } from '../../shared/contracts';

/** The acts on a verdict, by the names under which the contract tells what one may do. */
export const ACTS = ['submit', 'signOff', 'sendBack', 'withdraw', 'reRun'] as const;
export type Act = (typeof ACTS)[number];

/** What decides whether an act is open. */
export interface Standing {
  readonly state: VerdictState;
  readonly stale: boolean;
  readonly stops: number;
  readonly scopes: readonly Judgement['pairs'][number]['scope'][];
  /** Accounts that prepared the study or judged it. */
  readonly preparers: readonly string[];
}

export interface Actor {
  readonly accountId: string;
  readonly roles: readonly Role[];
}

/** Why an act is closed: a code for programs, a sentence for people. */
export interface Closed {
  readonly code: string;
  readonly reason: string;
}

const WHO: Record<Act, readonly Role[]> = {
  submit: ['analyst'],
  signOff: ['lead'],
  sendBack: ['lead'],
  withdraw: ['lead'],
  reRun: ['auditor', 'lead'],
};

const FROM: Record<Act, readonly VerdictState[] | 'any'> = {
  submit: ['judged', 'sent back'],
  signOff: ['submitted'],
  sendBack: ['submitted'],
  withdraw: ['signed off'],
  reRun: 'any',
};

const STATE_SENTENCE: Record<VerdictState, string> = {
  judged: 'It is not submitted yet.',
  submitted: 'It is submitted and waits for the lead.',
  'sent back': 'It was sent back to the analyst.',
  'signed off': 'It is signed off.',
  withdrawn: 'It was withdrawn.',
};

const STALE: Closed = {
  code: 'stale',
  reason: 'Runs or thresholds changed since it was judged. Judge the condition again.',
};

function closedToSignOff(standing: Standing, actor: Actor): Closed | null {
  if (standing.preparers.includes(actor.accountId))
    return { code: 'own-study', reason: 'You prepared this study. Another lead signs it off.' };
  if (standing.stale) return STALE;
  if (standing.scopes.includes('runs only'))
    return {
      code: 'runs-only',
      reason: 'The evidence reaches runs of one mount only: the fitting may be the cause. Add mounts.',
    };
  if (standing.stops > 0)
    return { code: 'stop-finding', reason: 'A check blocks sign-off. Its finding says what to do.' };
  return null;
}

/** Why this account can't do this act on this verdict now; null when it can. */
export function whyClosed(act: Act, standing: Standing, actor: Actor): Closed | null {
  const who = WHO[act];
  if (!who.some((role) => actor.roles.includes(role)))
    return { code: 'not-allowed', reason: `This is for the ${who.join(' or the ')}.` };
  const from = FROM[act];
  if (from !== 'any' && !from.includes(standing.state))
    return { code: 'wrong-state', reason: STATE_SENTENCE[standing.state] };
  if (act === 'submit' && standing.stale) return STALE;
  return act === 'signOff' ? closedToSignOff(standing, actor) : null;
}
