import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Lists ask for the newest verdict of each condition; with ten thousand stored that must not read them all. */
export class IndexVerdictsByCondition1796130000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      'create index verdicts_condition on verdicts (condition_id, metric, judged_at desc, id)',
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('drop index verdicts_condition');
  }
}
