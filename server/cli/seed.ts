import { createHash } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { AccountEntity } from '../accounts/account-entity';
import { reRunVerdict } from '../audit/re-run-service';
import { addBench } from '../benches/bench-service';
import type { Dependencies } from '../dependencies';
import type { Caller } from '../http/caller';
import { bringIn } from '../runs/intake-service';
import { addStudy } from '../studies/study-service';
import type { Study } from '../../shared/contracts';
import { judgeCondition } from '../verdicts/judge-service';
import { takeStep } from '../verdicts/verdict-steps';
import { DEMO, demoLogs, SAMPLE, type DemoLog } from './demo';
import { seedPeople, type DemoPeople } from './seed-people';

type Progress = (text: string) => void;

function idNamed(things: readonly { id: string; name: string }[], name: string): string {
  const thing = things.find((one) => one.name === name);
  if (!thing) throw new Error(`The demonstration has no “${name}”.`);
  return thing.id;
}

/** Takes one invented log the way a dropped file goes. */
async function bringInLog(
  log: DemoLog,
  study: Study,
  folder: string,
  analyst: Caller,
  dependencies: Dependencies,
): Promise<void> {
  const path = join(folder, log.fileName);
  await writeFile(path, log.bytes);
  const digest = createHash('sha256').update(log.bytes).digest('hex');
  const { fileName, mount, run, order } = log;
  const assignment = {
    fileName,
    digest,
    coolerId: idNamed(study.coolers, log.cooler),
    conditionId: idNamed(study.conditions, log.condition),
    mount,
    run,
    order,
    columnMap: null,
    fixedAmbient: null,
    window: null,
  };
  const file = { path, fileName, digest, size: log.bytes.length };
  const [outcome] = await bringIn(study.id, [file], [assignment], analyst, dependencies);
  if (outcome?.outcome !== 'stored')
    throw new Error(`${fileName} was not stored: ${JSON.stringify(outcome)}`);
}

async function bringInLogs(
  study: Study,
  analyst: Caller,
  dependencies: Dependencies,
  progress: Progress,
): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'tenthmark-demo-'));
  try {
    const logs = demoLogs();
    for (const [index, log] of logs.entries()) {
      progress(`reading demonstration log ${index + 1} of ${logs.length}`);
      await bringInLog(log, study, folder, analyst, dependencies);
    }
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** The first condition goes the whole way: signed off, and re-run once by the auditor. The second waits for the lead. */
async function judgeStudy(study: Study, people: DemoPeople, dependencies: Dependencies): Promise<void> {
  const { analyst, lead, auditor } = people;
  for (const [index, { id: conditionId }] of study.conditions.entries()) {
    const verdictId = await judgeCondition(study.id, { conditionId, metric: 'rise' }, analyst, dependencies);
    await takeStep('submit', verdictId, analyst, { comment: null }, dependencies);
    if (index > 0) continue;
    await takeStep('signOff', verdictId, lead, { comment: null }, dependencies);
    await reRunVerdict(verdictId, auditor, 'auditor', dependencies);
  }
}

async function fill(dependencies: Dependencies, progress: Progress): Promise<void> {
  const people = await seedPeople(dependencies.db.manager, dependencies, dependencies.clock());
  const bench = await addBench(
    {
      name: 'Bench 2',
      place: 'North room',
      heatSource: 'Heated copper block, 40 mm × 40 mm, sensor 2 mm under its face',
      notes: 'Invented for the demonstration, as is everything measured on it.',
    },
    people.administrator,
    dependencies,
  );
  const conditions = ({ conditions: all }: typeof DEMO): { name: string; nominalWatts: number }[] =>
    all.map(({ name, nominalWatts }) => ({ name, nominalWatts }));
  const [compared, reference] = DEMO.coolers;
  const study = await addStudy(
    {
      name: 'Fin coating, twin-tower pair',
      question:
        'Does the coating on the fins lower the heat source, and does it do so at the raised load too?',
      benchId: bench.id,
      compared: [compared],
      reference,
      conditions: conditions(DEMO),
    },
    people.analyst,
    dependencies,
  );
  await bringInLogs(study, people.analyst, dependencies, progress);
  progress('judging the demonstration');
  await judgeStudy(study, people, dependencies);
  await addStudy(
    {
      name: 'Fin height',
      question: 'Are the taller fins worth their height at the stock load?',
      benchId: bench.id,
      compared: [SAMPLE.coolers[0]],
      reference: SAMPLE.coolers[1],
      conditions: conditions(SAMPLE),
    },
    people.analyst,
    dependencies,
  );
}

/**
 * Fills an empty database with the invented team, through the same services as the routes. All of it in one
 * transaction: stopped half way, the database is empty as before. Does nothing where there is an account already.
 * @returns whether it did
 */
export async function seedDemo(dependencies: Dependencies, progress: Progress): Promise<boolean> {
  const { db } = dependencies;
  if (await db.manager.exists(AccountEntity)) return false;
  progress('making the demonstration team');
  return db.transaction(async (manager) => {
    // Two servers may start on one empty database.
    await manager.query('lock table teams in share row exclusive mode');
    if (await manager.exists(AccountEntity)) return false;
    const inside = {
      manager,
      transaction: manager.transaction.bind(manager),
      query: manager.query.bind(manager),
    };
    await fill({ ...dependencies, db: inside }, progress);
    return true;
  });
}
