import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { ChangePersonRequest, InvitePersonRequest, Person } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import { isDuplicate } from '../db/duplicate';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem, invalidFields, notFound } from '../http/problem';
import { AccountEntity } from './account-entity';
import { personView } from './account-view';
import { newToken, tokenDigest } from './passwords';
import { InvitationEntity } from './session-entity';
import { endSessions } from './session-service';

const INVITATION_DAYS = 14;

export async function people(manager: EntityManager, teamId: string): Promise<Person[]> {
  const rows = await manager.find(AccountEntity, { where: { teamId }, order: { name: 'ASC', id: 'ASC' } });
  return rows.map(personView);
}

async function sendInvitation(
  manager: EntityManager,
  account: Pick<AccountEntity, 'id' | 'name' | 'email' | 'teamId'>,
  caller: Caller,
  { clock, config, post }: Dependencies,
  address: string,
): Promise<void> {
  const token = newToken();
  const madeAt = clock();
  const expiresAt = new Date(madeAt.getTime() + INVITATION_DAYS * 24 * 60 * 60 * 1000);
  const invitation = { accountId: account.id, digest: tokenDigest(token), madeAt, expiresAt };
  await manager.upsert(InvitationEntity, invitation, ['accountId']);
  await post.queue(manager, {
    teamId: account.teamId,
    to: account.email,
    subject: `${caller.name} invites you to Tenthmark`,
    text: [
      `${account.name},`,
      `${caller.name} has added you to the team ${caller.team.name} on Tenthmark.`,
      `Choose a password here: ${config.publicUrl ?? address}/welcome/${token}`,
      `The link works once, for ${INVITATION_DAYS} days.`,
    ].join('\n\n'),
  });
}

const record = (
  manager: EntityManager,
  caller: Caller,
  at: Date,
  action: string,
  person: { id: string; name: string },
  content: Record<string, unknown>,
): Promise<void> =>
  appendToLedger(manager, {
    teamId: caller.team.id,
    at,
    by: caller.name,
    role: 'administrator',
    action,
    subject: { kind: 'person', id: person.id, name: person.name },
    content,
  });

/** @param address where the server is reached, for the link when no PUBLIC_URL is set */
export async function invitePerson(
  request: InvitePersonRequest,
  caller: Caller,
  address: string,
  dependencies: Dependencies,
): Promise<Person> {
  const { db, clock } = dependencies;
  const roles = [...new Set(request.roles)];
  try {
    return await db.transaction(async (manager) => {
      const account = manager.create(AccountEntity, {
        id: randomUUID(),
        teamId: caller.team.id,
        email: request.email,
        name: request.name,
        roles,
        passwordHash: null,
        demo: false,
        addedAt: clock(),
        stoppedAt: null,
        lastSignInAt: null,
      });
      await manager.insert(AccountEntity, account);
      await sendInvitation(manager, account, caller, dependencies, address);
      await record(manager, caller, clock(), 'person invited', account, { email: account.email, roles });
      return personView(account);
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
    throw invalidFields([{ path: 'email', message: 'This address already has an account.' }]);
  }
}

async function lockedPerson(manager: EntityManager, id: string, teamId: string): Promise<AccountEntity> {
  // All administrators with the person: of two who take the role from each other, the second must see the first.
  const rows = await manager
    .createQueryBuilder(AccountEntity, 'account')
    .where('account.team_id = :teamId', { teamId })
    .orderBy('account.id')
    .setLock('pessimistic_write')
    .getMany();
  const person = rows.find((row) => row.id === id);
  if (!person) throw notFound('person');
  return person;
}

async function hasAdministrator(manager: EntityManager, teamId: string): Promise<boolean> {
  const active = { teamId, stoppedAt: null };
  return manager
    .createQueryBuilder(AccountEntity, 'account')
    .where('account.team_id = :teamId', active)
    .andWhere(`account.stopped_at is null and account.password_hash is not null`)
    .andWhere(`'administrator' = any(account.roles)`)
    .getExists();
}

/** Changes someone's roles, stops their access or opens it again; at once, also where they are signed in. */
export async function changePerson(
  id: string,
  request: ChangePersonRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<Person> {
  return db.transaction(async (manager) => {
    const person = await lockedPerson(manager, id, caller.team.id);
    if (request.stopped && id === caller.accountId)
      throw new HttpProblem(
        409,
        'own-account',
        'You can’t stop your own account. Another administrator can.',
      );
    if (request.roles) person.roles = [...new Set(request.roles)];
    if (request.stopped !== undefined)
      person.stoppedAt = request.stopped ? (person.stoppedAt ?? clock()) : null;
    await manager.update(AccountEntity, id, { roles: person.roles, stoppedAt: person.stoppedAt });
    if (!(await hasAdministrator(manager, caller.team.id)))
      throw new HttpProblem(409, 'last-administrator', 'The team would have no administrator left.', {
        detail: 'Give someone else the role first.',
      });
    if (person.stoppedAt) await endSessions(manager, id, clock());
    await record(manager, caller, clock(), 'person changed', person, {
      roles: person.roles,
      stopped: person.stoppedAt !== null,
    });
    return personView(person);
  });
}

/** Sends a fresh link; the old one stops working. */
export async function inviteAgain(
  id: string,
  caller: Caller,
  address: string,
  dependencies: Dependencies,
): Promise<void> {
  const { db, clock } = dependencies;
  await db.transaction(async (manager) => {
    const account = await manager.findOneBy(AccountEntity, { id, teamId: caller.team.id });
    if (!account) throw notFound('person');
    if (account.passwordHash !== null || account.stoppedAt)
      throw new HttpProblem(409, 'not-invited', `${account.name} is not waiting for an invitation.`);
    await sendInvitation(manager, account, caller, dependencies, address);
    await record(manager, caller, clock(), 'person invited again', account, { email: account.email });
  });
}
