import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A message of a team, kept whether or not a mail server is set. */
@Entity('messages')
export class MessageEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') teamId: string;
  @Column('text') recipient: string;
  @Column('text') subject: string;
  @Column('text') text: string;
  @Column('timestamptz') at: Date;
  @Column('timestamptz', { nullable: true }) sentAt: Date | null;
  @Column('integer') tries: number;
}
