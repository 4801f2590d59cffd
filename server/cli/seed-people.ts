import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Role } from '../../shared/contracts';
import { AccountEntity, TeamEntity } from '../accounts/account-entity';
import { DEMO_PASSWORD } from '../accounts/demo-sign-ins';
import { hashPassword } from '../accounts/passwords';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { FIRST_VALUES, storeThresholds } from '../thresholds/thresholds-service';

/** The invented people, one a role. */
const PEOPLE: { role: Role; email: string; name: string }[] = [
  { role: 'analyst', email: 'analyst@tenthmark.example', name: 'Ana Lindqvist' },
  { role: 'lead', email: 'lead@tenthmark.example', name: 'Leo Baumann' },
  { role: 'auditor', email: 'auditor@tenthmark.example', name: 'Aud Kestrel' },
  { role: 'administrator', email: 'admin@tenthmark.example', name: 'Adi Moreau' },
];

export type DemoPeople = Record<Role, Caller>;

/** Makes the invented team, its people and its first thresholds, all in one transaction. */
export async function seedPeople(
  manager: EntityManager,
  dependencies: Dependencies,
  at: Date,
): Promise<DemoPeople> {
  const team = { id: randomUUID(), name: 'Cooler bench lab' };
  await manager.insert(TeamEntity, { ...team, madeAt: at });
  const passwordHash = await hashPassword(DEMO_PASSWORD, dependencies.passwordCost, 'password');
  const people = {} as DemoPeople;
  for (const [index, { role, email, name }] of PEOPLE.entries()) {
    const caller: Caller = { accountId: randomUUID(), sessionId: '', email, name, roles: [role], team };
    people[role] = caller;
    await manager.insert(AccountEntity, {
      id: caller.accountId,
      teamId: team.id,
      email,
      name,
      roles: [role],
      passwordHash,
      demo: true,
      // One after the other, so that lists keep this order.
      addedAt: new Date(at.getTime() + index),
      stoppedAt: null,
      lastSignInAt: null,
    });
  }
  await appendToLedger(manager, {
    teamId: team.id,
    at,
    by: people.administrator.name,
    role: 'administrator',
    action: 'team made',
    subject: { kind: 'team', id: team.id, name: team.name },
  });
  await storeThresholds(manager, {
    teamId: team.id,
    number: 1,
    values: FIRST_VALUES,
    reason: 'First set: buyers of this class of cooler notice half a degree in the reviews they compare.',
    by: people.lead.name,
    role: 'lead',
    at,
  });
  return people;
}
