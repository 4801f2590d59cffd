import { Column, Entity, PrimaryColumn } from 'typeorm';

/** One entry of a team's chained record. */
@Entity('ledger_entries')
export class LedgerEntryEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('integer') number: number;
  @Column('timestamptz') at: Date;
  @Column('text') by: string;
  @Column('text') role: string;
  @Column('text') action: string;
  @Column('text') subjectKind: string;
  @Column('uuid') subjectId: string;
  @Column('text') subjectName: string;
  @Column('jsonb') content: Record<string, unknown>;
  @Column('text', { nullable: true }) previous: string | null;
  @Column('text') digest: string;
}
