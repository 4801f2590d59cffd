import type { EntityManager } from 'typeorm';
import type { Role, VerdictRow, Waiting, WaitingGroup, WaitingItem } from '../../shared/contracts';
import { AccountEntity } from '../accounts/account-entity';
import type { Caller } from '../http/caller';
import { verdictRows, type VerdictsWanted } from '../verdicts/verdict-rows';
import { studiesInNeed } from './studies-in-need';

/** A newer verdict on the same condition and quantity takes an older one's place in the queue. */
const NEWEST = `v.id = (select n.id from verdicts n where n.condition_id = v.condition_id and n.metric = v.metric
  order by n.judged_at desc, n.id limit 1)`;

/** A verdict the caller prepared, or whose study they prepared: not theirs to sign. */
const OWN = `v.prepared_by = $2
  or exists (select 1 from studies o where o.id = v.study_id and o.prepared_by = $2)`;

/** How many things of one kind are shown as waiting. */
const SHOWN = 100;
const MOVING_SHOWN = 20;
const MOVING_DAYS = 14;

/** What was last said about each verdict in the state it is in. */
async function lastComments(
  manager: EntityManager,
  teamId: string,
  verdicts: readonly VerdictRow[],
): Promise<Map<string, string>> {
  const rows: { subject_id: string; comment: string | null }[] = await manager.query(
    `select distinct on (e.subject_id) e.subject_id, e.content ->> 'comment' as comment
       from ledger_entries e join verdicts v on v.id = e.subject_id and e.action = v.state
      where e.team_id = $1 and e.subject_id = any($2) order by e.subject_id, e.number desc`,
    [teamId, verdicts.map(({ id }) => id)],
  );
  return new Map(rows.flatMap((row) => (row.comment ? [[row.subject_id, row.comment] as const] : [])));
}

async function verdictsWaiting(
  manager: EntityManager,
  teamId: string,
  wanted: VerdictsWanted,
): Promise<WaitingItem[]> {
  const verdicts = await verdictRows(manager, teamId, { limit: SHOWN, ...wanted });
  const comments = await lastComments(manager, teamId, verdicts);
  return verdicts.map((verdict) => ({
    kind: 'verdict',
    verdict,
    comment: comments.get(verdict.id) ?? null,
  }));
}

async function invited(manager: EntityManager, teamId: string): Promise<WaitingItem[]> {
  const rows = await manager
    .createQueryBuilder(AccountEntity, 'account')
    .where('account.team_id = :teamId and account.password_hash is null', { teamId })
    .andWhere('account.stopped_at is null')
    .orderBy('account.added_at')
    .getMany();
  return rows.map(({ id, name, addedAt }) => ({
    kind: 'person',
    person: { id, name },
    since: addedAt.toISOString(),
    why: 'Invited, but has not chosen a password yet.',
  }));
}

type Groups = (manager: EntityManager, caller: Caller, now: Date) => Promise<WaitingGroup[]>;

const forAnalyst: Groups = async (manager, { team }) => [
  {
    code: 'sent back',
    needsMe: true,
    items: await verdictsWaiting(manager, team.id, { where: `v.state = 'sent back' and ${NEWEST}` }),
  },
  {
    code: 'to submit',
    needsMe: true,
    items: await verdictsWaiting(manager, team.id, { where: `v.state = 'judged' and ${NEWEST}` }),
  },
  { code: 'needs runs', needsMe: true, items: await studiesInNeed(manager, team.id, SHOWN) },
];

const forLead: Groups = async (manager, { team, accountId }, now) => [
  {
    code: 'to sign',
    needsMe: true,
    items: await verdictsWaiting(manager, team.id, {
      where: `v.state = 'submitted' and not (${OWN})`,
      values: [accountId],
    }),
  },
  {
    code: 'moving',
    needsMe: false,
    items: await verdictsWaiting(manager, team.id, {
      where: `${NEWEST} and (v.state in ('judged', 'sent back') or (v.state = 'submitted' and (${OWN}))
        or (v.state = 'signed off' and v.state_since > $3))`,
      values: [accountId, new Date(now.getTime() - MOVING_DAYS * 24 * 60 * 60 * 1000)],
      limit: MOVING_SHOWN,
    }),
  },
];

const forAuditor: Groups = async (manager, { team }) => [
  {
    code: 'differs',
    needsMe: true,
    items: await verdictsWaiting(manager, team.id, { where: `v.last_re_run_result <> 'identical'` }),
  },
  {
    code: 'not re-run',
    needsMe: true,
    items: await verdictsWaiting(manager, team.id, {
      where: `v.state = 'signed off' and v.last_re_run_at is null`,
    }),
  },
];

const forAdministrator: Groups = async (manager, { team }) => [
  { code: 'invited', needsMe: true, items: await invited(manager, team.id) },
];

const BY_ROLE: Record<Role, Groups> = {
  analyst: forAnalyst,
  lead: forLead,
  auditor: forAuditor,
  administrator: forAdministrator,
};

/** What waits for someone, for each of their roles. */
export async function waitingFor(manager: EntityManager, caller: Caller, now: Date): Promise<Waiting> {
  const roles: Waiting['roles'] = [];
  for (const role of caller.roles) {
    const groups = await BY_ROLE[role](manager, caller, now);
    const mine = groups.filter(({ needsMe }) => needsMe);
    roles.push({ role, count: mine.reduce((sum, { items }) => sum + items.length, 0), groups });
  }
  return { roles };
}
