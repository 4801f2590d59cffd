import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import {
  changeRunsRequestSchema,
  intakeResultSchema,
  runAssignmentsSchema,
  runsSchema,
  type Run,
  type RunAssignment,
} from '../../shared/contracts';
import { isStorableText } from '../db/text';
import type { Dependencies } from '../dependencies';
import { HttpProblem, invalid, invalidFields, notFound } from '../http/problem';
import { route, type Route } from '../http/route';
import { findStudy } from '../studies/study-service';
import { changeRuns } from './change-runs';
import { bringIn } from './intake-service';
import { digestOfLog, readLogBytes } from './log-store';
import { namedRuns, runView } from './run-view';
import { receivedFiles, receiveFiles } from './upload';

/** The `assignments` part of an upload: JSON in a form field.
 *  @throws HttpProblem 422 saying which entry and what is wrong with it */
function assignmentsOf(body: unknown): RunAssignment[] {
  const text = (body as { assignments?: unknown } | undefined)?.assignments;
  let value: unknown;
  try {
    value = JSON.parse(typeof text === 'string' ? text : '');
  } catch {
    throw invalidFields([
      { path: 'assignments', message: 'This part must be a JSON list, sent before the files.' },
    ]);
  }
  const parsed = runAssignmentsSchema.safeParse(value);
  if (!parsed.success) throw invalid(parsed.error);
  if (!isStorableText(parsed.data))
    throw invalidFields([{ path: 'assignments', message: 'A text holds a character that can’t be stored.' }]);
  return parsed.data;
}

async function studyRuns({ db }: Dependencies, studyId: string, teamId: string): Promise<{ runs: Run[] }> {
  await findStudy(db.manager, studyId, teamId);
  return { runs: (await namedRuns(db.manager, { studyId })).map(runView) };
}

/** The raw file as it came in. Its digest is checked first: altered bytes are not handed out as the record. */
async function sendLog(
  { db }: Dependencies,
  runId: string,
  teamId: string,
  response: Response,
): Promise<void> {
  const rows: { log_id: string; file_name: string; digest: string; size: number }[] = await db.query(
    `select r.log_id, r.file_name, l.digest, l.size from runs r join logs l on l.id = r.log_id
      where r.id = $1 and l.team_id = $2`,
    [runId, teamId],
  );
  const log = rows[0];
  if (!log) throw notFound('run');
  if ((await digestOfLog(db.manager, log.log_id)) !== log.digest)
    throw new HttpProblem(409, 'log-altered', 'The stored bytes of this log do not match their digest.', {
      detail: `${log.file_name} was altered in the database after it came in. Restore it from a backup.`,
    });
  response.attachment(log.file_name);
  response.type('application/octet-stream');
  response.setHeader('content-length', log.size);
  response.setHeader('x-content-sha256', log.digest);
  await pipeline(Readable.from(readLogBytes(db.manager, log.log_id)), response);
}

export const runRoutes = (dependencies: Dependencies): Route[] => [
  route({
    method: 'get',
    path: '/api/studies/:id/runs',
    who: 'any',
    answer: runsSchema,
    handle: ({ caller, id }) => studyRuns(dependencies, id, caller.team.id),
  }),
  route({
    method: 'post',
    path: '/api/studies/:id/runs',
    who: ['analyst'],
    before: [receiveFiles],
    answer: intakeResultSchema,
    handle: async ({ caller, id, request }) => {
      const assignments = assignmentsOf(request.body);
      return { outcomes: await bringIn(id, receivedFiles(request), assignments, caller, dependencies) };
    },
  }),
  route({
    method: 'patch',
    path: '/api/studies/:id/runs',
    who: ['analyst'],
    body: changeRunsRequestSchema,
    answer: runsSchema,
    handle: async ({ caller, id, body }) => {
      await changeRuns(id, body, caller, dependencies);
      return studyRuns(dependencies, id, caller.team.id);
    },
  }),
  route({
    method: 'get',
    path: '/api/runs/:id/log',
    who: 'any',
    answer: 'stream',
    handle: ({ caller, id, response }) => sendLog(dependencies, id, caller.team.id, response),
  }),
];
