import { Column, Entity, PrimaryColumn } from 'typeorm';
import type {
  Judgement,
  JudgementInput,
  Metric,
  PairRow,
  ReRunResult,
  VerdictState,
} from '../../shared/contracts';

/** A judgement that was kept, with everything it rests on. Only its state and its last re-run ever change. */
@Entity('verdicts')
export class VerdictEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('uuid') studyId: string;
  @Column('uuid') conditionId: string;
  @Column('text') metric: Metric;
  @Column('text') state: VerdictState;
  @Column('timestamptz') stateSince: Date;
  @Column('uuid') preparedBy: string;
  @Column('timestamptz') judgedAt: Date;
  @Column('uuid') thresholdsId: string;
  @Column('text') method: string;
  @Column('text') engine: string;
  @Column('jsonb', { select: false }) input: JudgementInput;
  @Column('jsonb', { select: false }) judgement: Judgement;
  /** SHA-256 over the canonical input, thresholds included. */
  @Column('text') dataDigest: string;
  /** SHA-256 over the evidence alone, to compare with the condition's. */
  @Column('text') evidence: string;
  /** What a list shows, taken from the judgement. */
  @Column('jsonb') pairs: PairRow[];
  @Column('integer') cautions: number;
  @Column('integer') stops: number;
  /** Headline numbers of the first pair, in the metric's unit, for queries. */
  @Column('double precision', { nullable: true }) gap: number | null;
  @Column('double precision', { nullable: true }) marginOfError: number | null;
  @Column('double precision', { nullable: true }) clearance: number | null;
  @Column('double precision', { nullable: true }) smallestVisibleGap: number | null;
  @Column('uuid', { nullable: true }) replacedBy: string | null;
  @Column('timestamptz', { nullable: true }) lastReRunAt: Date | null;
  @Column('text', { nullable: true }) lastReRunBy: string | null;
  @Column('text', { nullable: true }) lastReRunResult: ReRunResult | null;
}

/** A run as it stood when the verdict was made: later changes to the study leave the verdict's own evidence alone. */
@Entity('verdict_runs')
export class VerdictRunEntity {
  @PrimaryColumn('uuid') verdictId: string;
  @PrimaryColumn('integer') place: number;
  @Column('uuid') runId: string;
  @Column('text') digest: string;
  @Column('text') cooler: string;
  @Column('text', { nullable: true }) mount: string | null;
  @Column('text', { nullable: true }) leftOutReason: string | null;
}
