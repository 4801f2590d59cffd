import { Column, Entity, PrimaryColumn } from 'typeorm';

@Entity('studies')
export class StudyEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('text') name: string;
  @Column('text') question: string;
  @Column('uuid') benchId: string;
  @Column('uuid') preparedBy: string;
  @Column('timestamptz') madeAt: Date;
}

/** A load setting of a study, with what its stored runs amount to now. */
@Entity('conditions')
export class ConditionEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') studyId: string;
  @Column('integer') place: number;
  @Column('text') name: string;
  @Column('double precision', { nullable: true }) nominalWatts: number | null;
  /** SHA-256 over the evidence by rise and by resistance: a verdict made from other evidence is stale. */
  @Column('text', { nullable: true }) riseEvidence: string | null;
  @Column('text', { nullable: true }) resistanceEvidence: string | null;
}

/** A cooler's place in a study: compared coolers first, the reference last. */
@Entity('study_coolers')
export class StudyCoolerEntity {
  @PrimaryColumn('uuid') studyId: string;
  @PrimaryColumn('uuid') coolerId: string;
  @Column('integer') place: number;
  @Column('boolean') reference: boolean;
}
