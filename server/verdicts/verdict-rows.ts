import type { EntityManager } from 'typeorm';
import type { Metric, PairRow, ReRunResult, VerdictRow, VerdictState } from '../../shared/contracts';

interface RowOfQuery {
  id: string;
  study_id: string;
  study_name: string;
  condition_id: string;
  condition_name: string;
  nominal_watts: number | null;
  metric: Metric;
  state: VerdictState;
  state_since: Date;
  prepared_by: string;
  judged_at: Date;
  thresholds_number: number;
  method: string;
  pairs: PairRow[];
  cautions: number;
  stops: number;
  stale: boolean;
  last_re_run_at: Date | null;
  last_re_run_by: string | null;
  last_re_run_result: ReRunResult | null;
}

const view = (row: RowOfQuery): VerdictRow => ({
  id: row.id,
  study: { id: row.study_id, name: row.study_name },
  condition: { id: row.condition_id, name: row.condition_name, nominalWatts: row.nominal_watts },
  metric: row.metric,
  unit: row.metric === 'rise' ? '°C' : 'K/W',
  state: row.state,
  stateSince: row.state_since.toISOString(),
  preparedBy: row.prepared_by,
  judgedAt: row.judged_at.toISOString(),
  thresholdsNumber: row.thresholds_number,
  method: row.method,
  pairs: row.pairs,
  cautions: row.cautions,
  stops: row.stops,
  stale: row.stale,
  lastReRun:
    row.last_re_run_at && row.last_re_run_by && row.last_re_run_result
      ? { at: row.last_re_run_at.toISOString(), by: row.last_re_run_by, result: row.last_re_run_result }
      : null,
});

/** Which verdicts of a team: SQL on `v` (verdicts), with `$2`… from `values`. */
export interface VerdictsWanted {
  readonly where?: string;
  readonly values?: readonly unknown[];
  readonly limit?: number;
  readonly offset?: number;
}

/** Verdicts as lists show them, newest first. The page is found by the index alone before anything is joined to it. */
export async function verdictRows(
  manager: EntityManager,
  teamId: string,
  { where = 'true', values = [], limit = 1000, offset = 0 }: VerdictsWanted,
): Promise<VerdictRow[]> {
  const rows: RowOfQuery[] = await manager.query(
    `select v.id, v.study_id, s.name as study_name, v.condition_id, c.name as condition_name, c.nominal_watts,
            v.metric, v.state, v.state_since, a.name as prepared_by, v.judged_at, t.number as thresholds_number,
            v.method, v.pairs, v.cautions, v.stops, v.last_re_run_at, v.last_re_run_by, v.last_re_run_result,
            t.number <> (select max(number) from thresholds where team_id = $1)
              or v.evidence is distinct from
                 case v.metric when 'rise' then c.rise_evidence else c.resistance_evidence end as stale
       from (select v.id from verdicts v where v.team_id = $1 and (${where})
              order by v.judged_at desc, v.id limit ${limit} offset ${offset}) page
       join verdicts v on v.id = page.id
       join studies s on s.id = v.study_id
       join conditions c on c.id = v.condition_id
       join accounts a on a.id = v.prepared_by
       join thresholds t on t.id = v.thresholds_id
      order by v.judged_at desc, v.id`,
    [teamId, ...values],
  );
  return rows.map(view);
}

export async function countVerdicts(
  manager: EntityManager,
  teamId: string,
  { where = 'true', values = [] }: VerdictsWanted,
): Promise<number> {
  const rows: { count: string }[] = await manager.query(
    `select count(*) from verdicts v where v.team_id = $1 and (${where})`,
    [teamId, ...values],
  );
  return Number(rows[0]?.count ?? 0);
}
