import type { EntityManager } from 'typeorm';
import { verdictStepSchema, type Verdict } from '../../shared/contracts';
import { LedgerEntryEntity } from '../audit/ledger-entity';
import { notFound } from '../http/problem';
import { BenchEntity } from '../benches/bench-entity';
import { ConditionEntity, StudyEntity } from '../studies/study-entity';
import { ThresholdsEntity } from '../thresholds/thresholds-entity';
import { thresholdsInForce, valuesOf } from '../thresholds/thresholds-service';
import { ACTS, whyClosed, type Actor, type Standing } from './acts';
import { VerdictEntity } from './verdict-entity';
import { verdictRows } from './verdict-rows';

/** A verdict with its evidence, as the acts and the audit need it.
 *  @throws HttpProblem 404 when the team has no such verdict */
export async function wholeVerdict(
  manager: EntityManager,
  id: string,
  teamId: string,
): Promise<VerdictEntity> {
  const verdict = await manager
    .createQueryBuilder(VerdictEntity, 'verdict')
    .addSelect(['verdict.input', 'verdict.judgement'])
    .where('verdict.id = :id and verdict.team_id = :teamId', { id, teamId })
    .getOne();
  if (!verdict) throw notFound('verdict');
  return verdict;
}

const condition = async (manager: EntityManager, verdict: VerdictEntity): Promise<ConditionEntity> =>
  manager.findOneByOrFail(ConditionEntity, { id: verdict.conditionId });

async function whyStale(manager: EntityManager, verdict: VerdictEntity): Promise<string[]> {
  const { riseEvidence, resistanceEvidence } = await condition(manager, verdict);
  const made = await manager.findOneByOrFail(ThresholdsEntity, { id: verdict.thresholdsId });
  const latest = await thresholdsInForce(manager, verdict.teamId);
  const evidence = verdict.metric === 'rise' ? riseEvidence : resistanceEvidence;
  return [
    ...(evidence === verdict.evidence ? [] : ['Runs of this condition were added or changed since.']),
    ...(made.number === latest.number
      ? []
      : [`Made with thresholds set ${made.number}; set ${latest.number} is in force.`]),
  ];
}

/** What decides which acts are open on a verdict now. */
export async function standingOf(manager: EntityManager, verdict: VerdictEntity): Promise<Standing> {
  const study = await manager.findOneByOrFail(StudyEntity, { id: verdict.studyId });
  return {
    state: verdict.state,
    stale: (await whyStale(manager, verdict)).length > 0,
    stops: verdict.stops,
    scopes: verdict.judgement.pairs.map(({ scope }) => scope),
    preparers: [verdict.preparedBy, study.preparedBy],
  };
}

async function stepsOf(manager: EntityManager, verdict: VerdictEntity): Promise<Verdict['steps']> {
  const entries = await manager.find(LedgerEntryEntity, {
    where: { teamId: verdict.teamId, subjectId: verdict.id },
    order: { number: 'ASC' },
  });
  return entries.map((entry) =>
    verdictStepSchema.parse({
      action: entry.action,
      by: entry.by,
      role: entry.role,
      at: entry.at.toISOString(),
      comment: typeof entry.content['comment'] === 'string' ? entry.content['comment'] : null,
    }),
  );
}

async function logsOf(manager: EntityManager, verdictId: string): Promise<Verdict['logs']> {
  return manager.query(
    `select vr.run_id as "runId", r.file_name as "fileName", vr.digest
       from verdict_runs vr join runs r on r.id = vr.run_id where vr.verdict_id = $1 order by vr.place`,
    [verdictId],
  );
}

/** A verdict whole, with what the account asking may do with it and why not the rest. */
export async function verdictView(
  manager: EntityManager,
  id: string,
  teamId: string,
  actor: Actor,
): Promise<Verdict> {
  const verdict = await wholeVerdict(manager, id, teamId);
  const [row] = await verdictRows(manager, teamId, { where: 'v.id = $2', values: [id] });
  if (!row) throw notFound('verdict');
  const study = await manager.findOneByOrFail(StudyEntity, { id: verdict.studyId });
  const bench = await manager.findOneByOrFail(BenchEntity, { id: study.benchId });
  const made = await manager.findOneByOrFail(ThresholdsEntity, { id: verdict.thresholdsId });
  const latest = await thresholdsInForce(manager, teamId);
  const standing = await standingOf(manager, verdict);
  const closed = ACTS.map((act) => ({ act, why: whyClosed(act, standing, actor) }));
  const isOpen = (wanted: string): boolean => closed.some(({ act, why }) => act === wanted && why === null);
  return {
    ...row,
    bench: { id: bench.id, name: bench.name },
    question: study.question,
    input: verdict.input,
    judgement: verdict.judgement,
    thresholds: {
      number: made.number,
      values: valuesOf(made),
      inForceSince: made.inForceSince.toISOString(),
      latestNumber: latest.number,
    },
    dataDigest: verdict.dataDigest,
    logs: await logsOf(manager, id),
    staleReasons: await whyStale(manager, verdict),
    steps: await stepsOf(manager, verdict),
    may: {
      submit: isOpen('submit'),
      signOff: isOpen('signOff'),
      sendBack: isOpen('sendBack'),
      withdraw: isOpen('withdraw'),
      reRun: isOpen('reRun'),
    },
    mayNot: Object.fromEntries(closed.flatMap(({ act, why }) => (why ? [[act, why.reason]] : []))),
  };
}
