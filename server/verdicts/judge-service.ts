import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { judge } from '../../shared/judgement';
import type { Judgement, JudgementInput, JudgeRequest, Metric, PairRow } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import { digestOf, storable } from '../db/storable';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem, invalidFields } from '../http/problem';
import { findStudy, type StudyParts } from '../studies/study-service';
import { thresholdsInForce, valuesOf } from '../thresholds/thresholds-service';
import { evidenceOf, placedRuns, type Evidence, type StoredRun } from './evidence';
import { VerdictEntity, VerdictRunEntity } from './verdict-entity';

/** Seed of whatever a method draws at random. Stored with each verdict; one for all, so that nobody can pick. */
const SEED = 20_261_201;

/** @throws HttpProblem 422 naming the coolers or runs without which there is nothing to judge */
function checkEvidence(metric: Metric, coolers: StudyParts['coolers'], runs: readonly StoredRun[]): void {
  const kept = runs.filter(({ leftOutReason }) => leftOutReason === null);
  const bare = coolers.filter(({ name }) => !kept.some(({ cooler }) => cooler === name));
  if (bare.length > 0)
    throw new HttpProblem(422, 'cooler-without-runs', 'Some coolers have no runs under this condition.', {
      detail: `Bring in runs of ${bare.map(({ name }) => name).join(', ')}, then judge.`,
    });
  const unpowered = kept.filter(({ summary }) => metric === 'resistance' && summary.resistance === null);
  if (unpowered.length > 0)
    throw new HttpProblem(422, 'no-watts', 'Resistance needs the watts of every run.', {
      detail: `Without watts: ${unpowered.map(({ fileName }) => fileName).join(', ')}. Leave them out with a reason, or judge the rise.`,
    });
}

const pairRows = ({ pairs, words }: Judgement): PairRow[] =>
  pairs.map((pair, index) => ({
    a: pair.a,
    b: pair.b,
    gap: pair.gap,
    marginOfError: pair.marginOfError,
    clearance: pair.clearance,
    gapThatMatters: pair.gapThatMatters,
    flag: pair.flag,
    sizeCall: pair.sizeCall,
    notJudgedCode: pair.notJudged?.code ?? null,
    headline: words[index]?.headline ?? '',
  }));

interface Judged {
  parts: StudyParts;
  conditionId: string;
  thresholdsId: string;
  evidence: Evidence;
  runs: readonly StoredRun[];
  input: JudgementInput;
  judgement: Judgement;
}

async function storeVerdict(
  manager: EntityManager,
  judged: Judged,
  caller: Caller,
  at: Date,
): Promise<string> {
  const { parts, conditionId, evidence, input, judgement } = judged;
  const { metric } = input;
  const id = randomUUID();
  const dataDigest = digestOf(input);
  const [first] = judgement.pairs;
  const count = (level: string): number =>
    judgement.findings.filter((finding) => finding.level === level).length;
  await manager.insert(VerdictEntity, {
    id,
    teamId: caller.team.id,
    studyId: parts.study.id,
    conditionId,
    metric,
    state: 'judged',
    stateSince: at,
    preparedBy: caller.accountId,
    judgedAt: at,
    thresholdsId: judged.thresholdsId,
    method: judgement.method,
    engine: judgement.engine,
    input: input as object,
    judgement: judgement as object,
    dataDigest,
    evidence: digestOf(evidence),
    pairs: pairRows(judgement),
    cautions: count('caution'),
    stops: count('stop'),
    gap: first?.gap ?? null,
    marginOfError: first?.marginOfError ?? null,
    clearance: first?.clearance ?? null,
    smallestVisibleGap: first?.smallestVisibleGap ?? null,
    replacedBy: null,
    lastReRunAt: null,
    lastReRunBy: null,
    lastReRunResult: null,
  });
  await manager.insert(
    VerdictRunEntity,
    judged.runs.map(({ id: runId, digest, cooler, mount, leftOutReason }, place) => ({
      verdictId: id,
      place,
      runId,
      digest,
      cooler,
      mount,
      leftOutReason,
    })),
  );
  await appendToLedger(manager, {
    teamId: caller.team.id,
    at,
    by: caller.name,
    role: 'analyst',
    action: 'judged',
    subject: { kind: 'verdict', id, name: nameOf(parts, conditionId) },
    content: {
      metric,
      method: judgement.method,
      engine: judgement.engine,
      thresholds: input.thresholds,
      input: dataDigest,
      judgement: digestOf(judgement),
      logs: judged.runs.map(({ digest }) => digest),
    },
  });
  return id;
}

const nameOf = ({ study, conditions }: StudyParts, conditionId: string): string =>
  `${study.name}, ${conditions.find(({ id }) => id === conditionId)?.name ?? ''}`;

/**
 * Judges a condition of a study from its stored runs, by the thresholds in force, and keeps the verdict. Asked again
 * with nothing changed, it gives the verdict that is there.
 * @returns the verdict's id
 */
export async function judgeCondition(
  studyId: string,
  { conditionId, metric }: JudgeRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<string> {
  return db.transaction(async (manager) => {
    // Held, so that the runs judged are the runs the study has, and two requests make one verdict.
    const parts = await findStudy(manager, studyId, caller.team.id, { lock: true });
    const condition = parts.conditions.find(({ id }) => id === conditionId);
    if (!condition)
      throw invalidFields([{ path: 'conditionId', message: 'This study has no such condition.' }]);
    const runs = await placedRuns(manager, studyId, conditionId, parts.coolers);
    checkEvidence(metric, parts.coolers, runs);
    const coolers = parts.coolers.map(({ name }) => name);
    const evidence = evidenceOf(metric, condition.nominalWatts, coolers, runs);
    const thresholds = await thresholdsInForce(manager, caller.team.id);
    const input = storable({ ...evidence, thresholds: valuesOf(thresholds), bench: null, seed: SEED });
    const judgement = storable(judge(input));
    const known = await manager
      .createQueryBuilder(VerdictEntity, 'verdict')
      .where(
        `verdict.condition_id = :conditionId and verdict.metric = :metric and verdict.state <> 'withdrawn'`,
      )
      .andWhere(
        'verdict.data_digest = :digest and verdict.thresholds_id = :thresholds and verdict.method = :method',
      )
      .setParameters({ conditionId, metric, digest: digestOf(input), thresholds: thresholds.id })
      .setParameter('method', judgement.method)
      .getOne();
    if (known) return known.id;
    const thresholdsId = thresholds.id;
    return storeVerdict(
      manager,
      { parts, conditionId, thresholdsId, evidence, runs, input, judgement },
      caller,
      clock(),
    );
  });
}
