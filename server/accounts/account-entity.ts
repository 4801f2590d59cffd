import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { Role } from '../../shared/contracts';

@Entity('teams')
export class TeamEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('text') name: string;
  @Column('timestamptz') madeAt: Date;
}

@Entity('accounts')
export class AccountEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  /** Lower case; one account an address over all teams. */
  @Column('text') email: string;
  @Column('text') name: string;
  @Column('text', { array: true }) roles: Role[];
  /** bcrypt; null until the invitation is accepted. */
  @Column('text', { nullable: true }) passwordHash: string | null;
  /** Belongs to the invented team and still has its published password. */
  @Column('boolean') demo: boolean;
  @Column('timestamptz') addedAt: Date;
  @Column('timestamptz', { nullable: true }) stoppedAt: Date | null;
  @Column('timestamptz', { nullable: true }) lastSignInAt: Date | null;
}
