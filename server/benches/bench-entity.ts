import { Column, Entity, PrimaryColumn } from 'typeorm';

@Entity('benches')
export class BenchEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('text') name: string;
  @Column('text') place: string;
  @Column('text') heatSource: string;
  @Column('text') notes: string;
  @Column('timestamptz') addedAt: Date;
}

@Entity('coolers')
export class CoolerEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('text') name: string;
  @Column('text') notes: string;
  @Column('timestamptz') addedAt: Date;
}
