import type { EntityManager } from 'typeorm';
import type { Condition, Study, StudyCooler, StudyRow, VerdictRow } from '../../shared/contracts';
import { notFound } from '../http/problem';
import { verdictRows } from '../verdicts/verdict-rows';

interface StudyOfQuery {
  id: string;
  name: string;
  question: string;
  bench_id: string;
  bench_name: string;
  prepared_by: string;
  made_at: Date;
}

const STUDY = `select s.id, s.name, s.question, s.bench_id, b.name as bench_name, a.name as prepared_by, s.made_at
  from studies s join benches b on b.id = s.bench_id join accounts a on a.id = s.prepared_by`;

function grouped<T extends { study_id: string }>(rows: readonly T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const row of rows) groups.set(row.study_id, [...(groups.get(row.study_id) ?? []), row]);
  return groups;
}

async function conditionsOf(manager: EntityManager, ids: string[]): Promise<Map<string, Condition[]>> {
  const rows: (Condition & { study_id: string })[] = await manager.query(
    `select study_id, id, name, nominal_watts as "nominalWatts" from conditions
      where study_id = any($1) order by place`,
    [ids],
  );
  return grouped(rows);
}

async function coolersOf(manager: EntityManager, ids: string[]): Promise<Map<string, StudyCooler[]>> {
  const rows: (StudyCooler & { study_id: string })[] = await manager.query(
    `select sc.study_id, c.id, c.name, sc.reference from study_coolers sc join coolers c on c.id = sc.cooler_id
      where sc.study_id = any($1) order by sc.place`,
    [ids],
  );
  return grouped(rows);
}

async function runCounts(
  manager: EntityManager,
  ids: string[],
): Promise<Map<string, { runs: number; leftOut: number }>> {
  const rows: { study_id: string; runs: number; left_out: number }[] = await manager.query(
    `select study_id, count(*)::int as runs, count(left_out_at)::int as left_out from runs
      where study_id = any($1) group by study_id`,
    [ids],
  );
  return new Map(rows.map((row) => [row.study_id, { runs: row.runs, leftOut: row.left_out }]));
}

async function complete(
  manager: EntityManager,
  studies: readonly StudyOfQuery[],
  verdicts: readonly VerdictRow[],
): Promise<Study[]> {
  const ids = studies.map(({ id }) => id);
  const conditions = await conditionsOf(manager, ids);
  const coolers = await coolersOf(manager, ids);
  const counts = await runCounts(manager, ids);
  return studies.map((study) => ({
    id: study.id,
    name: study.name,
    question: study.question,
    bench: { id: study.bench_id, name: study.bench_name },
    coolers: coolers.get(study.id) ?? [],
    conditions: conditions.get(study.id) ?? [],
    preparedBy: study.prepared_by,
    madeAt: study.made_at.toISOString(),
    runs: counts.get(study.id)?.runs ?? 0,
    runsLeftOut: counts.get(study.id)?.leftOut ?? 0,
    verdicts: verdicts.filter((verdict) => verdict.study.id === study.id),
  }));
}

/** A study with all its verdicts, newest first.
 *  @throws HttpProblem 404 when the team has no such study */
export async function studyView(manager: EntityManager, id: string, teamId: string): Promise<Study> {
  const rows: StudyOfQuery[] = await manager.query(`${STUDY} where s.id = $1 and s.team_id = $2`, [
    id,
    teamId,
  ]);
  const verdicts = await verdictRows(manager, teamId, { where: 'v.study_id = $2', values: [id] });
  const [study] = await complete(manager, rows, verdicts);
  if (!study) throw notFound('study');
  return study;
}

interface StudiesWanted {
  readonly search: string;
  readonly sort: 'newest' | 'name';
  readonly page: number;
  readonly pageSize: number;
}

/** One page of a team's studies, each with the newest verdict on rise of each condition. */
export async function studiesPage(
  manager: EntityManager,
  teamId: string,
  { search, sort, page, pageSize }: StudiesWanted,
): Promise<{ items: StudyRow[]; page: number; pageSize: number; total: number }> {
  // The words of a search stand for themselves: % and _ are not wild cards here.
  const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`;
  const where = `where s.team_id = $1 and ($2 = '%%' or s.name ilike $2 or s.question ilike $2 or exists (
    select 1 from study_coolers sc join coolers k on k.id = sc.cooler_id
     where sc.study_id = s.id and k.name ilike $2))`;
  const order = sort === 'name' ? 'lower(s.name)' : 's.made_at desc, s.id';
  const studies: StudyOfQuery[] = await manager.query(
    `${STUDY} ${where} order by ${order} limit $3 offset $4`,
    [teamId, pattern, pageSize, (page - 1) * pageSize],
  );
  const counted: { count: string }[] = await manager.query(`select count(*) from studies s ${where}`, [
    teamId,
    pattern,
  ]);
  const verdicts = await verdictRows(manager, teamId, {
    where: `v.id in (select (select n.id from verdicts n where n.condition_id = k.id and n.metric = 'rise'
      order by n.judged_at desc, n.id limit 1) from conditions k where k.study_id = any($2))`,
    values: [studies.map(({ id }) => id)],
  });
  const items = (await complete(manager, studies, verdicts)).map(({ runsLeftOut: _, ...row }) => row);
  return { items, page, pageSize, total: Number(counted[0]?.count ?? 0) };
}
