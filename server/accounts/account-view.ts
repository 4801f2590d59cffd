import type { EntityManager } from 'typeorm';
import type { Account, Person } from '../../shared/contracts';
import { AccountEntity, TeamEntity } from './account-entity';

/** An account as its owner sees it. */
export async function accountView(manager: EntityManager, accountId: string): Promise<Account> {
  const account = await manager.findOneByOrFail(AccountEntity, { id: accountId });
  const team = await manager.findOneByOrFail(TeamEntity, { id: account.teamId });
  return {
    id: account.id,
    email: account.email,
    name: account.name,
    roles: account.roles,
    team: { id: team.id, name: team.name },
  };
}

function stateOf(account: AccountEntity): Person['state'] {
  if (account.stoppedAt) return 'stopped';
  return account.passwordHash === null ? 'invited' : 'active';
}

/** An account as the administrator sees it. */
export const personView = (account: AccountEntity): Person => ({
  id: account.id,
  email: account.email,
  name: account.name,
  roles: account.roles,
  state: stateOf(account),
  addedAt: account.addedAt.toISOString(),
  lastSignInAt: account.lastSignInAt?.toISOString() ?? null,
});
