import type { EntityManager } from 'typeorm';
import type { Run } from '../../shared/contracts';
import { RunEntity } from './run-entity';
import { byNaturalOrder } from './natural-order';

/** A run with the names that stand behind its ids. */
export interface NamedRun extends RunEntity {
  mount: string | null;
  digest: string;
  size: number;
  broughtInByName: string;
  leftOutByName: string | null;
}

/** Runs of a study with their names, by condition and cooler as planned, then mount and order of testing. */
export async function namedRuns(
  manager: EntityManager,
  where: { studyId: string; conditionId?: string; id?: string },
): Promise<NamedRun[]> {
  const builder = manager
    .createQueryBuilder(RunEntity, 'run')
    .where('run.study_id = :studyId', { studyId: where.studyId });
  if (where.conditionId)
    builder.andWhere('run.condition_id = :conditionId', { conditionId: where.conditionId });
  if (where.id) builder.andWhere('run.id = :id', { id: where.id });
  const runs = await builder.getMany();
  const names: {
    id: string;
    mount: string | null;
    digest: string;
    size: number;
    brought_in_by: string;
    left_out_by: string | null;
    condition_place: number;
    cooler_place: number;
  }[] = await manager.query(
    `select r.id, m.name as mount, l.digest, l.size, b.name as brought_in_by, o.name as left_out_by,
            c.place as condition_place, sc.place as cooler_place
       from runs r join logs l on l.id = r.log_id join accounts b on b.id = r.brought_in_by
       join conditions c on c.id = r.condition_id
       join study_coolers sc on sc.study_id = r.study_id and sc.cooler_id = r.cooler_id
       left join mounts m on m.id = r.mount_id left join accounts o on o.id = r.left_out_by
      where r.id = any($1)`,
    [runs.map(({ id }) => id)],
  );
  const byId = new Map(names.map((row) => [row.id, row]));
  return runs
    .flatMap((run) => {
      const row = byId.get(run.id);
      return row ? [{ run, row }] : [];
    })
    .sort(
      (one, other) =>
        one.row.condition_place - other.row.condition_place ||
        one.row.cooler_place - other.row.cooler_place ||
        byNaturalOrder(one.row.mount ?? '', other.row.mount ?? '') ||
        (one.run.testOrder ?? Infinity) - (other.run.testOrder ?? Infinity) ||
        byNaturalOrder(one.run.name, other.run.name) ||
        (one.row.digest < other.row.digest ? -1 : 1),
    )
    .map(({ run, row }) => ({
      ...run,
      mount: row.mount,
      digest: row.digest,
      size: row.size,
      broughtInByName: row.brought_in_by,
      leftOutByName: row.left_out_by,
    }));
}

export const runView = (run: NamedRun): Run => ({
  id: run.id,
  coolerId: run.coolerId,
  conditionId: run.conditionId,
  mount: run.mount,
  name: run.name,
  order: run.testOrder,
  fileName: run.fileName,
  digest: run.digest,
  bytes: run.size,
  columns: run.columns,
  columnMap: run.columnMap,
  summary: run.summary,
  sketch: run.sketch,
  leftOut:
    run.leftOutReason !== null && run.leftOutAt && run.leftOutByName !== null
      ? { reason: run.leftOutReason, by: run.leftOutByName, at: run.leftOutAt.toISOString() }
      : null,
  broughtInBy: run.broughtInByName,
  broughtInAt: run.broughtInAt.toISOString(),
});
