import type { AcceptInvitationRequest, Account, ChangePasswordRequest } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem, invalidFields } from '../http/problem';
import { AccountEntity } from './account-entity';
import { accountView } from './account-view';
import { hashPassword, passwordMatches, tokenDigest } from './passwords';
import { InvitationEntity } from './session-entity';
import { endSessions, startSession, type Tokens } from './session-service';

/** Changes one's own password; sessions on other devices end. */
export async function changePassword(
  request: ChangePasswordRequest,
  caller: Caller,
  { db, clock, passwordCost }: Dependencies,
): Promise<void> {
  const account = await db.manager.findOneByOrFail(AccountEntity, { id: caller.accountId });
  if (!(await passwordMatches(request.current, account.passwordHash, passwordCost)))
    throw invalidFields([{ path: 'current', message: 'This is not your current password.' }]);
  const passwordHash = await hashPassword(request.next, passwordCost, 'next');
  await db.transaction(async (manager) => {
    await manager.update(AccountEntity, account.id, { passwordHash, demo: false });
    await endSessions(manager, account.id, clock(), caller.sessionId);
  });
}

/** An invited person chooses a password and is signed in. The link works once. */
export async function acceptInvitation(
  request: AcceptInvitationRequest,
  dependencies: Dependencies,
): Promise<{ account: Account; tokens: Tokens }> {
  const { db, clock, passwordCost } = dependencies;
  const passwordHash = await hashPassword(request.password, passwordCost, 'password');
  return db.transaction(async (manager) => {
    const invitation = await manager.findOne(InvitationEntity, {
      where: { digest: tokenDigest(request.token) },
      lock: { mode: 'pessimistic_write' },
    });
    const account =
      invitation && invitation.expiresAt > clock()
        ? await manager.findOneBy(AccountEntity, { id: invitation.accountId })
        : null;
    if (!account || account.stoppedAt)
      throw new HttpProblem(404, 'no-invitation', 'This invitation was used, replaced or ran out.', {
        detail: 'An administrator of the team can send a new one.',
      });
    await manager.delete(InvitationEntity, account.id);
    await manager.update(AccountEntity, account.id, { passwordHash });
    await appendToLedger(manager, {
      teamId: account.teamId,
      at: clock(),
      by: account.name,
      role: account.roles[0] ?? 'none',
      action: 'invitation accepted',
      subject: { kind: 'person', id: account.id, name: account.name },
    });
    const tokens = await startSession(manager, account.id, dependencies);
    return { account: await accountView(manager, account.id), tokens };
  });
}
