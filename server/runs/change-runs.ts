import { In, type EntityManager } from 'typeorm';
import type { ChangeRunsRequest } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { HttpProblem, invalidFields, notFound } from '../http/problem';
import type { ConditionEntity } from '../studies/study-entity';
import { findStudy, type StudyParts } from '../studies/study-service';
import { refreshEvidence } from '../verdicts/evidence';
import { readLogBytes } from './log-store';
import { mountNamed } from './mounts';
import { reduceLog } from './reduce-log';
import { MountEntity, RunEntity } from './run-entity';

function checkPlaces({ coolers, conditions }: StudyParts, request: ChangeRunsRequest): void {
  if (request.coolerId && !coolers.some(({ id }) => id === request.coolerId))
    throw invalidFields([{ path: 'coolerId', message: 'This study has no such cooler.' }]);
  if (request.conditionId && !conditions.some(({ id }) => id === request.conditionId))
    throw invalidFields([{ path: 'conditionId', message: 'This study has no such condition.' }]);
}

/** The watts a run is checked against are its condition's: moved to another, it is reduced again from its bytes. */
async function move(
  manager: EntityManager,
  run: RunEntity,
  from: ConditionEntity,
  to: ConditionEntity,
): Promise<void> {
  run.conditionId = to.id;
  if (from.nominalWatts === to.nominalWatts) return;
  const { reduced } = await reduceLog(run.fileName, readLogBytes(manager, run.logId), {
    columnMap: run.chosenMap,
    fixedAmbient: run.fixedAmbientCelsius,
    window: run.handWindow,
    nominalWatts: to.nominalWatts,
  });
  if (!reduced)
    throw new HttpProblem(
      409,
      'log-altered',
      `${run.fileName} can’t be read any more as it was when it came in.`,
      {
        detail: 'Its stored bytes were altered. Nothing was changed.',
      },
    );
  run.summary = reduced.summary;
  run.sketch = reduced.sketch;
  run.riseCelsius = reduced.summary.rise;
  run.resistanceKelvinPerWatt = reduced.summary.resistance;
}

async function refit(manager: EntityManager, run: RunEntity, request: ChangeRunsRequest): Promise<void> {
  // A mount belongs to its cooler: with another cooler, it is a mount of the same name there.
  const current = run.mountId && (await manager.findOneByOrFail(MountEntity, { id: run.mountId }));
  const name = request.mount === undefined ? (current ? current.name : null) : request.mount;
  run.coolerId = request.coolerId ?? run.coolerId;
  run.mountId = name === null ? null : await mountNamed(manager, run.studyId, run.coolerId, name);
}

/** Changes several runs of a study at once, all or none. What is left out stays in the record, with its reason. */
export async function changeRuns(
  studyId: string,
  request: ChangeRunsRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<void> {
  await db.transaction(async (manager) => {
    const parts = await findStudy(manager, studyId, caller.team.id, { lock: true });
    checkPlaces(parts, request);
    const ids = [...new Set(request.runIds)];
    const runs = await manager.findBy(RunEntity, { id: In(ids), studyId });
    if (runs.length !== ids.length) throw notFound('run in this study');
    const at = clock();
    const conditionOf = (id: string): ConditionEntity => {
      const condition = parts.conditions.find((one) => one.id === id);
      if (!condition) throw new Error(`Condition ${id} is not of study ${studyId}.`);
      return condition;
    };
    const touched = new Set(runs.map(({ conditionId }) => conditionId));
    for (const run of runs) {
      if (request.conditionId) {
        await move(manager, run, conditionOf(run.conditionId), conditionOf(request.conditionId));
        touched.add(request.conditionId);
      }
      await refit(manager, run, request);
      if (request.leaveOut !== undefined) {
        run.leftOutReason = request.leaveOut?.reason ?? null;
        run.leftOutBy = request.leaveOut ? caller.accountId : null;
        run.leftOutAt = request.leaveOut ? at : null;
      }
    }
    await manager.save(RunEntity, runs);
    for (const id of touched) await refreshEvidence(manager, conditionOf(id), parts.coolers);
    const { runIds: _, ...changes } = request;
    await appendToLedger(manager, {
      teamId: caller.team.id,
      at,
      by: caller.name,
      role: 'analyst',
      action:
        request.leaveOut === undefined
          ? 'runs changed'
          : request.leaveOut
            ? 'runs left out'
            : 'runs put back',
      subject: { kind: 'study', id: studyId, name: parts.study.name },
      content: { runs: runs.map(({ id, fileName }) => ({ id, fileName })), changes },
    });
  });
}
