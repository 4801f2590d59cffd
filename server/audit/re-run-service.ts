import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { ENGINE_VERSION, judge } from '../../shared/judgement';
import type { Judgement, JudgementInput, ReRun, Role } from '../../shared/contracts';
import { storable } from '../db/storable';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { readLogBytes } from '../runs/log-store';
import { reduceLog } from '../runs/reduce-log';
import { RunEntity } from '../runs/run-entity';
import { ConditionEntity } from '../studies/study-entity';
import { ThresholdsEntity } from '../thresholds/thresholds-entity';
import { valuesOf } from '../thresholds/thresholds-service';
import { evidenceOf, type PlacedRun } from '../verdicts/evidence';
import { VerdictEntity, VerdictRunEntity } from '../verdicts/verdict-entity';
import { verdictName } from '../verdicts/verdict-steps';
import { wholeVerdict } from '../verdicts/verdict-view';
import { differences } from './differences';
import { appendToLedger } from './ledger-service';

/** Why a verdict can't be computed again. */
class NotReRun extends Error {}

async function* hashed(
  bytes: AsyncIterable<Uint8Array>,
  hash: { update(data: Uint8Array): unknown },
): AsyncGenerator<Uint8Array> {
  for await (const chunk of bytes) {
    hash.update(chunk);
    yield chunk;
  }
}

/** Reads a run's raw bytes back, checks them against the digest the verdict holds, and reduces them as at first. */
async function reduceAgain(
  manager: EntityManager,
  used: VerdictRunEntity,
  nominalWatts: number | null,
): Promise<PlacedRun> {
  const run = await manager.findOneByOrFail(RunEntity, { id: used.runId });
  const hash = createHash('sha256');
  const result = await reduceLog(run.fileName, hashed(readLogBytes(manager, run.logId), hash), {
    columnMap: run.chosenMap,
    fixedAmbient: run.fixedAmbientCelsius,
    window: run.handWindow,
    nominalWatts,
  });
  if (hash.digest('hex') !== used.digest)
    throw new NotReRun(`The stored bytes of ${run.fileName} are not those the verdict was made from.`);
  if (!result.reduced)
    throw new NotReRun(`${run.fileName}: ${result.problems[0]?.text ?? 'it can’t be read.'}`);
  return {
    cooler: used.cooler,
    mount: used.mount,
    name: run.name,
    testOrder: run.testOrder,
    digest: used.digest,
    summary: result.reduced.summary,
    leftOutReason: used.leftOutReason,
  };
}

async function inputAgain(manager: EntityManager, verdict: VerdictEntity): Promise<JudgementInput> {
  const used = await manager.find(VerdictRunEntity, {
    where: { verdictId: verdict.id },
    order: { place: 'ASC' },
  });
  const condition = await manager.findOneByOrFail(ConditionEntity, { id: verdict.conditionId });
  const coolers: { name: string }[] = await manager.query(
    `select c.name from study_coolers sc join coolers c on c.id = sc.cooler_id
      where sc.study_id = $1 order by sc.place`,
    [verdict.studyId],
  );
  const runs: PlacedRun[] = [];
  for (const one of used) runs.push(await reduceAgain(manager, one, condition.nominalWatts));
  const evidence = evidenceOf(
    verdict.metric,
    condition.nominalWatts,
    coolers.map(({ name }) => name),
    runs,
  );
  const thresholds = await manager.findOneByOrFail(ThresholdsEntity, { id: verdict.thresholdsId });
  const { bench, seed } = verdict.input;
  return storable({ ...evidence, thresholds: valuesOf(thresholds), bench, seed });
}

function judgeAgain(input: JudgementInput, method: string): Judgement {
  try {
    return storable(judge(input, method));
  } catch (error) {
    throw new NotReRun(`Method ${method} gave no judgement: ${(error as Error).message}`);
  }
}

type Outcome = Pick<ReRun, 'result' | 'logsRead' | 'fieldsCompared' | 'differences' | 'reason'>;

async function compute(manager: EntityManager, verdict: VerdictEntity): Promise<Outcome> {
  try {
    const input = await inputAgain(manager, verdict);
    // The engine's version is told apart; that it is another is no difference in what it found.
    const { engine: _stored, ...judgement } = verdict.judgement;
    const { engine: _now, ...reRun } = judgeAgain(input, verdict.method);
    const inputs = differences(verdict.input, input, 'input');
    const judgements = differences(judgement, reRun, 'judgement');
    const found = [...inputs.differences, ...judgements.differences];
    return {
      result: found.length === 0 ? 'identical' : 'differs',
      logsRead: await manager.countBy(VerdictRunEntity, { verdictId: verdict.id }),
      fieldsCompared: inputs.fieldsCompared + judgements.fieldsCompared,
      differences: found,
      reason: null,
    };
  } catch (error) {
    if (!(error instanceof NotReRun)) throw error;
    return { result: "can't re-run", logsRead: 0, fieldsCompared: 0, differences: [], reason: error.message };
  }
}

/** How many differing paths the ledger names; the count is always whole. */
const PATHS_KEPT = 20;

/**
 * Computes a verdict again from the raw files as they are stored, and compares every field of its input and its
 * judgement bit for bit. The result is recorded, whatever it is.
 */
export async function reRunVerdict(
  id: string,
  caller: Caller,
  role: Role,
  { db, clock }: Dependencies,
): Promise<ReRun> {
  const verdict = await wholeVerdict(db.manager, id, caller.team.id);
  const outcome = await compute(db.manager, verdict);
  const at = clock();
  const engine = { stored: verdict.engine, now: ENGINE_VERSION };
  await db.transaction(async (manager) => {
    await manager.update(VerdictEntity, id, {
      lastReRunAt: at,
      lastReRunBy: caller.name,
      lastReRunResult: outcome.result,
    });
    await appendToLedger(manager, {
      teamId: caller.team.id,
      at,
      by: caller.name,
      role,
      action: 're-run',
      subject: { kind: 'verdict', id, name: await verdictName(manager, verdict) },
      content: {
        result: outcome.result,
        reason: outcome.reason,
        logsRead: outcome.logsRead,
        fieldsCompared: outcome.fieldsCompared,
        differences: outcome.differences.length,
        paths: outcome.differences.slice(0, PATHS_KEPT).map(({ path }) => path),
        engine,
        comment: outcome.reason ?? outcome.result,
      },
    });
  });
  return { verdictId: id, ...outcome, at: at.toISOString(), by: caller.name, engine, method: verdict.method };
}
