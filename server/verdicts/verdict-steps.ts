import type { EntityManager } from 'typeorm';
import { AccountEntity } from '../accounts/account-entity';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem, invalidFields, notFound } from '../http/problem';
import { ConditionEntity, StudyEntity } from '../studies/study-entity';
import { whyClosed, type Act } from './acts';
import { VerdictEntity } from './verdict-entity';
import { standingOf, wholeVerdict } from './verdict-view';

type StepAct = Exclude<Act, 'reRun'>;

const STEPS = {
  submit: { to: 'submitted', role: 'analyst' },
  signOff: { to: 'signed off', role: 'lead' },
  sendBack: { to: 'sent back', role: 'lead' },
  withdraw: { to: 'withdrawn', role: 'lead' },
} as const;

export async function verdictName(manager: EntityManager, verdict: VerdictEntity): Promise<string> {
  const study = await manager.findOneByOrFail(StudyEntity, { id: verdict.studyId });
  const condition = await manager.findOneByOrFail(ConditionEntity, { id: verdict.conditionId });
  return `${study.name}, ${condition.name}`;
}

/** Who is told of a step: the leads of a verdict to sign, its preparer of what became of it. */
async function readersOf(manager: EntityManager, act: StepAct, verdict: VerdictEntity): Promise<string[]> {
  if (act === 'withdraw') return [];
  const builder = manager
    .createQueryBuilder(AccountEntity, 'account')
    .where('account.team_id = :teamId and account.stopped_at is null', { teamId: verdict.teamId });
  if (act === 'submit') builder.andWhere(`'lead' = any(account.roles) and account.password_hash is not null`);
  else builder.andWhere('account.id = :id', { id: verdict.preparedBy });
  return (await builder.getMany()).map(({ email }) => email);
}

function letterText(
  act: StepAct,
  name: string,
  caller: Caller,
  comment: string | null,
  link: string,
): string {
  const sentence = {
    submit: `${caller.name} submitted the verdict on ${name} for sign-off.`,
    signOff: `${caller.name} signed off the verdict on ${name}.`,
    sendBack: `${caller.name} sent back the verdict on ${name}.`,
    withdraw: `${caller.name} withdrew the verdict on ${name}.`,
  }[act];
  return [sentence, ...(comment ? [comment] : []), link].join('\n\n');
}

async function tell(
  manager: EntityManager,
  act: StepAct,
  verdict: VerdictEntity,
  name: string,
  caller: Caller,
  comment: string | null,
  { post, config }: Dependencies,
): Promise<void> {
  const text = letterText(act, name, caller, comment, `${config.publicUrl ?? ''}/verdicts/${verdict.id}`);
  for (const to of await readersOf(manager, act, verdict)) {
    if (to === caller.email) continue;
    await post.queue(manager, { teamId: verdict.teamId, to, subject: `${name}: ${STEPS[act].to}`, text });
  }
}

/**
 * Takes a verdict one step on. The row is held from the check to the change, so that of two who act at once the
 * second is told what the first did.
 * @throws HttpProblem 404 for no such verdict; 409 with the reason when the step is closed
 */
export async function takeStep(
  act: StepAct,
  id: string,
  caller: Caller,
  { comment, replacedBy = null }: { comment: string | null; replacedBy?: string | null },
  dependencies: Dependencies,
): Promise<void> {
  const { db, clock } = dependencies;
  await db.transaction(async (manager) => {
    const teamId = caller.team.id;
    // The study first, as all who change its runs do: what was signed off is what stood then.
    const held: { id: string }[] = await manager.query(
      `select s.id from studies s join verdicts v on v.study_id = s.id
        where v.id = $1 and v.team_id = $2 for update of s, v`,
      [id, teamId],
    );
    if (held.length === 0) throw notFound('verdict');
    const verdict = await wholeVerdict(manager, id, teamId);
    const closed = whyClosed(act, await standingOf(manager, verdict), caller);
    if (closed) throw new HttpProblem(409, closed.code, closed.reason);
    if (
      replacedBy !== null &&
      (replacedBy === id || !(await manager.existsBy(VerdictEntity, { id: replacedBy, teamId })))
    )
      throw invalidFields([{ path: 'replacedBy', message: 'There is no such other verdict.' }]);
    const at = clock();
    const { to, role } = STEPS[act];
    await manager.update(
      VerdictEntity,
      { id, state: verdict.state },
      { state: to, stateSince: at, replacedBy },
    );
    const name = await verdictName(manager, verdict);
    await appendToLedger(manager, {
      teamId,
      at,
      by: caller.name,
      role,
      action: to,
      subject: { kind: 'verdict', id, name },
      content: { comment, input: verdict.dataDigest, ...(replacedBy ? { replacedBy } : {}) },
    });
    await tell(manager, act, verdict, name, caller, comment, dependencies);
  });
}
