import 'reflect-metadata';
import { DataSource } from 'typeorm';
import { AccountEntity, TeamEntity } from '../accounts/account-entity';
import { InvitationEntity, RefreshTokenEntity, SessionEntity } from '../accounts/session-entity';
import { LedgerEntryEntity } from '../audit/ledger-entity';
import { BenchEntity, CoolerEntity } from '../benches/bench-entity';
import { MessageEntity } from '../mail/message-entity';
import { LogEntity, LogPartEntity, MountEntity, RunEntity } from '../runs/run-entity';
import { ConditionEntity, StudyCoolerEntity, StudyEntity } from '../studies/study-entity';
import { ThresholdsEntity } from '../thresholds/thresholds-entity';
import { VerdictEntity, VerdictRunEntity } from '../verdicts/verdict-entity';
import { CreateTables1796126400000 } from './migrations/1796126400000-create-tables';
import { IndexVerdictsByCondition1796130000000 } from './migrations/1796130000000-index-verdicts-by-condition';
import { SnakeNaming } from './naming';

/** The way to the database at `url`; not yet connected. Tables come from migrations only. */
export function createDataSource(url: string, poolSize = 10): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: [
      TeamEntity,
      AccountEntity,
      SessionEntity,
      RefreshTokenEntity,
      InvitationEntity,
      MessageEntity,
      BenchEntity,
      CoolerEntity,
      StudyEntity,
      ConditionEntity,
      StudyCoolerEntity,
      MountEntity,
      LogEntity,
      LogPartEntity,
      RunEntity,
      ThresholdsEntity,
      VerdictEntity,
      VerdictRunEntity,
      LedgerEntryEntity,
    ],
    migrations: [CreateTables1796126400000, IndexVerdictsByCondition1796130000000],
    namingStrategy: new SnakeNaming(),
    synchronize: false,
    migrationsTransactionMode: 'each',
    installExtensions: false,
    applicationName: 'tenthmark',
    poolSize,
    extra: { idleTimeoutMillis: 30_000, keepAlive: true },
  });
}

/** Any number that no other program in this database locks by. */
const MIGRATION_LOCK = 7_304_162_201;

/** Brings the tables up to date. Several servers may start at once: one works, the others wait. */
export async function migrate(db: DataSource): Promise<void> {
  const lock = db.createQueryRunner();
  try {
    await lock.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await db.runMigrations();
  } finally {
    await lock.query('select pg_advisory_unlock($1)', [MIGRATION_LOCK]).catch(() => undefined);
    await lock.release();
  }
}
