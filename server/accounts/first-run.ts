import { randomUUID } from 'node:crypto';
import type { Account, FirstRunRequest } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import { HttpProblem } from '../http/problem';
import { FIRST_VALUES, storeThresholds } from '../thresholds/thresholds-service';
import { AccountEntity, TeamEntity } from './account-entity';
import { accountView } from './account-view';
import { hashPassword } from './passwords';
import { startSession, type Tokens } from './session-service';

/** Makes the first team and its administrator, once, on a server that has no account yet. */
export async function firstRun(
  request: FirstRunRequest,
  dependencies: Dependencies,
): Promise<{ account: Account; tokens: Tokens }> {
  const { db, clock, passwordCost } = dependencies;
  const passwordHash = await hashPassword(request.password, passwordCost, 'password');
  return db.transaction(async (manager) => {
    // Two people on the first page at once: one of them is first.
    await manager.query('lock table teams in share row exclusive mode');
    if (await manager.exists(AccountEntity))
      throw new HttpProblem(
        409,
        'already-set-up',
        'This server already has its first team. Sign in instead.',
      );
    const at = clock();
    const team = { id: randomUUID(), name: request.team, madeAt: at };
    await manager.insert(TeamEntity, team);
    const accountId = randomUUID();
    await manager.insert(AccountEntity, {
      id: accountId,
      teamId: team.id,
      email: request.email,
      name: request.name,
      roles: ['administrator'],
      passwordHash,
      demo: false,
      addedAt: at,
      stoppedAt: null,
      lastSignInAt: null,
    });
    const who = { teamId: team.id, by: request.name, role: 'administrator', at };
    await appendToLedger(manager, {
      ...who,
      action: 'team made',
      subject: { kind: 'team', id: team.id, name: team.name },
    });
    const reason = 'What a new team begins with; for the lead to change.';
    await storeThresholds(manager, { ...who, number: 1, values: FIRST_VALUES, reason });
    const tokens = await startSession(manager, accountId, dependencies);
    return { account: await accountView(manager, accountId), tokens };
  });
}
