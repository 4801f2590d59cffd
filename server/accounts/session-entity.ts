import { Column, Entity, PrimaryColumn } from 'typeorm';

/** One sign-in on one device: the family of refresh tokens that follow from it. */
@Entity('sessions')
export class SessionEntity {
  @PrimaryColumn('uuid') id: string;
  @Column('uuid') accountId: string;
  @Column('timestamptz') startedAt: Date;
  @Column('timestamptz', { nullable: true }) revokedAt: Date | null;
}

/** A refresh token, known only by its SHA-256. Each is used once. */
@Entity('refresh_tokens')
export class RefreshTokenEntity {
  @PrimaryColumn('text') digest: string;
  @Column('uuid') sessionId: string;
  @Column('timestamptz') expiresAt: Date;
  @Column('timestamptz', { nullable: true }) usedAt: Date | null;
}

/** A way in for someone invited, known only by the SHA-256 of its token. A new one replaces the old. */
@Entity('invitations')
export class InvitationEntity {
  @PrimaryColumn('uuid') accountId: string;
  @Column('text') digest: string;
  @Column('timestamptz') madeAt: Date;
  @Column('timestamptz') expiresAt: Date;
}
