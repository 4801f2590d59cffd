import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import type { EntityManager } from 'typeorm';
import type { IntakeOutcome, LogProblem, RunAssignment } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { findStudy, type StudyParts } from '../studies/study-service';
import { refreshEvidence } from '../verdicts/evidence';
import { storeLog, type ReceivedFile } from './log-store';
import { mountNamed } from './mounts';
import { reduceLog, type LogChoices, type ReducedLog } from './reduce-log';
import { RunEntity } from './run-entity';
import { namedRuns, runView } from './run-view';

const READ_BYTES = 256 * 1024;

const problem = (file: string, code: string, text: string): LogProblem => ({
  code,
  file,
  row: null,
  column: null,
  text,
});

const refused = (fileName: string, problems: LogProblem[]): IntakeOutcome => ({
  outcome: 'refused',
  fileName,
  problems,
});

/** What keeps a file from being stored before it is even read; null when nothing does. */
function misplaced(parts: StudyParts, assignment: RunAssignment): LogProblem | null {
  const file = assignment.fileName;
  if (!parts.coolers.some(({ id }) => id === assignment.coolerId))
    return problem(file, 'unknown cooler', 'This study has no such cooler. Choose one of its coolers.');
  if (!parts.conditions.some(({ id }) => id === assignment.conditionId))
    return problem(
      file,
      'unknown condition',
      'This study has no such condition. Choose one of its conditions.',
    );
  return null;
}

/** The run of the study that was brought in from the same bytes, if there is one. */
async function sameBytes(
  manager: EntityManager,
  studyId: string,
  file: ReceivedFile,
): Promise<IntakeOutcome | null> {
  const rows: { id: string; file_name: string }[] = await manager.query(
    `select r.id, r.file_name from runs r join logs l on l.id = r.log_id
      where r.study_id = $1 and l.digest = $2`,
    [studyId, file.digest],
  );
  const known = rows[0];
  if (!known) return null;
  return {
    outcome: 'already stored',
    fileName: file.fileName,
    runId: known.id,
    text: `The same bytes are already in this study, as ${known.file_name}. Nothing was added.`,
  };
}

interface Reading {
  file: ReceivedFile;
  assignment: RunAssignment;
  choices: LogChoices;
  reduced: ReducedLog;
}

async function storeRun(
  manager: EntityManager,
  parts: StudyParts,
  { file, assignment, choices, reduced }: Reading,
  caller: Caller,
  at: Date,
): Promise<IntakeOutcome> {
  const { study, conditions, coolers } = parts;
  const condition = conditions.find(({ id }) => id === assignment.conditionId);
  if (!condition) throw new Error('A condition went missing.');
  const logId = await storeLog(manager, study.teamId, file, at);
  const { coolerId, mount, run: name } = assignment;
  const id = randomUUID();
  await manager.insert(RunEntity, {
    id,
    studyId: study.id,
    conditionId: condition.id,
    coolerId,
    mountId: mount === null ? null : await mountNamed(manager, study.id, coolerId, mount),
    name,
    testOrder: assignment.order,
    fileName: file.fileName,
    logId,
    columns: reduced.columns,
    columnMap: reduced.columnMap,
    chosenMap: choices.columnMap,
    fixedAmbientCelsius: choices.fixedAmbient,
    handWindow: choices.window,
    riseCelsius: reduced.summary.rise,
    resistanceKelvinPerWatt: reduced.summary.resistance,
    summary: reduced.summary as object,
    sketch: reduced.sketch,
    leftOutReason: null,
    leftOutBy: null,
    leftOutAt: null,
    broughtInBy: caller.accountId,
    broughtInAt: at,
  });
  await refreshEvidence(manager, condition, coolers);
  await appendToLedger(manager, {
    teamId: study.teamId,
    at,
    by: caller.name,
    role: 'analyst',
    action: 'run brought in',
    subject: { kind: 'run', id, name: file.fileName },
    content: {
      study: study.name,
      condition: condition.name,
      cooler: coolers.find((cooler) => cooler.id === coolerId)?.name,
      mount,
      run: name,
      log: file.digest,
      choices,
      rise: reduced.summary.rise,
      resistance: reduced.summary.resistance,
    },
  });
  const [stored] = await namedRuns(manager, { studyId: study.id, id });
  if (!stored) throw new Error('The stored run can’t be found.');
  return { outcome: 'stored', fileName: file.fileName, run: runView(stored) };
}

async function bringInOne(
  file: ReceivedFile,
  assignment: RunAssignment,
  parts: StudyParts,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<IntakeOutcome> {
  const wrong = misplaced(parts, assignment);
  if (wrong) return refused(file.fileName, [wrong]);
  const studyId = parts.study.id;
  const known = await sameBytes(db.manager, studyId, file);
  if (known) return known;
  const condition = parts.conditions.find(({ id }) => id === assignment.conditionId);
  const choices: LogChoices = {
    columnMap: assignment.columnMap,
    fixedAmbient: assignment.fixedAmbient,
    window: assignment.window,
    nominalWatts: condition?.nominalWatts ?? null,
  };
  const bytes = createReadStream(file.path, { highWaterMark: READ_BYTES });
  const result = await reduceLog(file.fileName, bytes, choices);
  if (!result.reduced) return refused(file.fileName, result.problems);
  const reading = { file, assignment, choices, reduced: result.reduced };
  return db.transaction(async (manager) => {
    const locked = await findStudy(manager, studyId, caller.team.id, { lock: true });
    // Again, now that nobody else can add to the study: the same drop may have been sent twice.
    return (
      (await sameBytes(manager, studyId, file)) ?? (await storeRun(manager, locked, reading, caller, clock()))
    );
  });
}

/** Pairs each assignment with its file: by name and digest, so that what arrives is what the browser read. */
function pairUp(
  files: readonly ReceivedFile[],
  assignments: readonly RunAssignment[],
): { file: ReceivedFile | null; assignment: RunAssignment | null; fileName: string }[] {
  const left = [...files];
  const pairs = assignments.map((assignment) => {
    const index = left.findIndex(
      (file) => file.fileName === assignment.fileName && file.digest === assignment.digest,
    );
    const [file] = index < 0 ? [] : left.splice(index, 1);
    return { file: file ?? null, assignment, fileName: assignment.fileName };
  });
  return [...pairs, ...left.map((file) => ({ file, assignment: null, fileName: file.fileName }))];
}

/**
 * Stores what was dropped, each file in a transaction of its own: one bad file spoils no other, and every file and
 * every assignment gets its answer.
 */
export async function bringIn(
  studyId: string,
  files: readonly ReceivedFile[],
  assignments: readonly RunAssignment[],
  caller: Caller,
  dependencies: Dependencies,
): Promise<IntakeOutcome[]> {
  const parts = await findStudy(dependencies.db.manager, studyId, caller.team.id);
  const outcomes: IntakeOutcome[] = [];
  for (const { file, assignment, fileName } of pairUp(files, assignments)) {
    if (!file) {
      const text = 'The file did not arrive, or its bytes are not those that were read. Drop it again.';
      outcomes.push(refused(fileName, [problem(fileName, 'not received', text)]));
    } else if (!assignment) {
      const text =
        'Nothing says which cooler and condition this file belongs to. Assign it, then send it again.';
      outcomes.push(refused(fileName, [problem(fileName, 'not assigned', text)]));
    } else {
      outcomes.push(
        await bringInOne(file, assignment, parts, caller, dependencies).catch((error: unknown) => {
          dependencies.report(`Storing ${fileName} failed`, error);
          const text = 'The server failed at this file and stored nothing of it. Send it again.';
          return refused(fileName, [problem(fileName, 'not stored', text)]);
        }),
      );
    }
  }
  return outcomes;
}
