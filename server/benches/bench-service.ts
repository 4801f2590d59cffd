import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { AddBenchRequest, AddCoolerRequest, Bench, Cooler } from '../../shared/contracts';
import { appendToLedger } from '../audit/ledger-service';
import { isDuplicate } from '../db/duplicate';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { invalidFields, notFound } from '../http/problem';
import { BenchEntity, CoolerEntity } from './bench-entity';

export const benchView = (row: BenchEntity): Bench => ({
  id: row.id,
  name: row.name,
  place: row.place,
  heatSource: row.heatSource,
  notes: row.notes,
  addedAt: row.addedAt.toISOString(),
});

const coolerView = ({ id, name, notes }: CoolerEntity): Cooler => ({ id, name, notes });

export async function benches(manager: EntityManager, teamId: string): Promise<Bench[]> {
  const rows = await manager.find(BenchEntity, { where: { teamId }, order: { name: 'ASC' } });
  return rows.map(benchView);
}

/** @throws HttpProblem 404 when the team has no such bench */
export async function findBench(manager: EntityManager, id: string, teamId: string): Promise<BenchEntity> {
  const bench = await manager.findOneBy(BenchEntity, { id, teamId });
  if (!bench) throw notFound('bench');
  return bench;
}

export async function coolers(manager: EntityManager, teamId: string): Promise<Cooler[]> {
  const rows = await manager.find(CoolerEntity, { where: { teamId }, order: { name: 'ASC' } });
  return rows.map(coolerView);
}

const taken = (what: string): Error =>
  invalidFields([{ path: 'name', message: `The team already has a ${what} of this name.` }]);

export async function addBench(
  request: AddBenchRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<Bench> {
  const bench = db.manager.create(BenchEntity, {
    id: randomUUID(),
    teamId: caller.team.id,
    ...request,
    addedAt: clock(),
  });
  try {
    await db.transaction(async (manager) => {
      await manager.insert(BenchEntity, bench);
      await appendToLedger(manager, {
        teamId: caller.team.id,
        at: bench.addedAt,
        by: caller.name,
        role: 'administrator',
        action: 'bench added',
        subject: { kind: 'bench', id: bench.id, name: bench.name },
      });
    });
  } catch (error) {
    throw isDuplicate(error, 'benches_name') ? taken('bench') : error;
  }
  return benchView(bench);
}

export async function addCooler(
  request: AddCoolerRequest,
  caller: Caller,
  { db, clock }: Dependencies,
): Promise<Cooler> {
  const cooler = { id: randomUUID(), teamId: caller.team.id, ...request, addedAt: clock() };
  try {
    await db.manager.insert(CoolerEntity, cooler);
  } catch (error) {
    throw isDuplicate(error, 'coolers_name') ? taken('cooler') : error;
  }
  return coolerView(cooler);
}

/** The team's cooler of this name, whatever its capitals; added when there is none. */
export async function coolerNamed(
  manager: EntityManager,
  name: string,
  teamId: string,
  at: Date,
): Promise<CoolerEntity> {
  await manager.query(
    `insert into coolers (id, team_id, name, notes, added_at) values ($1, $2, $3, '', $4)
     on conflict (team_id, lower(name)) do nothing`,
    [randomUUID(), teamId, name, at],
  );
  return manager
    .createQueryBuilder(CoolerEntity, 'cooler')
    .where('cooler.team_id = :teamId and lower(cooler.name) = lower(:name)', { teamId, name })
    .getOneOrFail();
}
