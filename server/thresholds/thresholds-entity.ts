import { Column, Entity, PrimaryColumn } from 'typeorm';

/** One set of acceptance thresholds. Never changed once stored. */
@Entity('thresholds')
export class ThresholdsEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('integer') number: number;
  @Column('double precision') confidence: number;
  @Column('double precision') power: number;
  @Column('double precision') gapThatMattersCelsius: number;
  @Column('text') reason: string;
  @Column('text') madeBy: string;
  @Column('timestamptz') inForceSince: Date;
}
