import type { EntityManager } from 'typeorm';
import type { WaitingItem } from '../../shared/contracts';

interface RowOfQuery {
  id: string;
  name: string;
  bench: string;
  coolers: string[];
  runs: number;
  since: Date;
  missing: string[] | null;
}

function why({ runs, missing }: RowOfQuery): string {
  if (runs === 0) return 'No runs yet.';
  const [first, ...others] = missing ?? [];
  if (!first) return 'All its runs are in. Judge it.';
  return others.length === 0 ? `No runs of ${first}.` : `No runs of ${first} and ${others.length} more.`;
}

/** Studies without a verdict, and what each lacks. Since when: the last run came in, or the study was made. */
export async function studiesInNeed(
  manager: EntityManager,
  teamId: string,
  limit: number,
): Promise<WaitingItem[]> {
  const rows: RowOfQuery[] = await manager.query(
    `select s.id, s.name, b.name as bench,
            (select array_agg(k.name order by sc.place) from study_coolers sc join coolers k on k.id = sc.cooler_id
              where sc.study_id = s.id) as coolers,
            (select count(*)::int from runs r where r.study_id = s.id) as runs,
            coalesce((select max(r.brought_in_at) from runs r where r.study_id = s.id), s.made_at) as since,
            (select array_agg(k.name || ' under ' || c.name order by c.place, sc.place)
               from conditions c join study_coolers sc on sc.study_id = c.study_id
               join coolers k on k.id = sc.cooler_id
              where c.study_id = s.id and not exists (
                select 1 from runs r where r.condition_id = c.id and r.cooler_id = sc.cooler_id
                   and r.left_out_at is null)) as missing
       from studies s join benches b on b.id = s.bench_id
      where s.team_id = $1 and not exists (select 1 from verdicts v where v.study_id = s.id)
      order by s.made_at desc, s.id limit $2`,
    [teamId, limit],
  );
  return rows.map((row) => ({
    kind: 'study',
    study: { id: row.id, name: row.name, coolers: row.coolers, bench: row.bench },
    runs: row.runs,
    since: row.since.toISOString(),
    why: why(row),
  }));
}
