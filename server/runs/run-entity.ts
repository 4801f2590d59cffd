import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { ColumnMap, FoundColumn, RunSummary, TraceSketch } from '../../shared/contracts';

/** One fitting of a cooler in a study. */
@Entity('mounts')
export class MountEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') studyId: string;
  @Column('uuid') coolerId: string;
  @Column('text') name: string;
}

/** A raw file of a team, unchanged, found by its SHA-256. The bytes are in `log_parts`, 1 MB a row. */
@Entity('logs')
export class LogEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('text') digest: string;
  @Column('integer') size: number;
  @Column('timestamptz') storedAt: Date;
}

@Entity('log_parts')
export class LogPartEntity {
  @PrimaryColumn('uuid') logId: string;
  @PrimaryColumn('integer') part: number;
  @Column('bytea', { select: false }) bytes: Buffer;
}

/** A steady window set by hand: seconds since the log's start, and why. */
export interface HandWindow {
  from: number;
  to: number;
  reason: string;
}

@Entity('runs')
export class RunEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') studyId: string;
  @Column('uuid') conditionId: string;
  @Column('uuid') coolerId: string;
  @Column('uuid', { nullable: true }) mountId: string | null;
  @Column('text') name: string;
  /** Place in the order of testing over the study, from 1. */
  @Column('integer', { nullable: true }) testOrder: number | null;
  @Column('text') fileName: string;
  @Column('uuid') logId: string;
  @Column('jsonb') columns: FoundColumn[];
  /** The map the log was read with. `chosenMap` is the same when a person chose it, null when it was recognised. */
  @Column('jsonb') columnMap: ColumnMap;
  @Column('jsonb', { nullable: true }) chosenMap: ColumnMap | null;
  @Column('double precision', { nullable: true }) fixedAmbientCelsius: number | null;
  @Column('jsonb', { nullable: true }) handWindow: HandWindow | null;
  @Column('double precision') riseCelsius: number;
  @Column('double precision', { nullable: true }) resistanceKelvinPerWatt: number | null;
  @Column('jsonb') summary: RunSummary;
  @Column('jsonb') sketch: TraceSketch;
  @Column('text', { nullable: true }) leftOutReason: string | null;
  @Column('uuid', { nullable: true }) leftOutBy: string | null;
  @Column('timestamptz', { nullable: true }) leftOutAt: Date | null;
  @Column('uuid') broughtInBy: string;
  @Column('timestamptz') broughtInAt: Date;
}
