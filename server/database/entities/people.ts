import { Check, Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';

@Entity('users')
@Check('users_email_lower', 'email = lower(email)')
export class User {
  @PrimaryColumn('uuid')
  id!: string;

  @Index('users_email_key', { unique: true })
  @Column('text')
  email!: string;

  @Column('text')
  name!: string;

  @Column('text', { name: 'password_hash' })
  passwordHash!: string;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;
}

@Entity('teams')
export class Team {
  @PrimaryColumn('uuid')
  id!: string;

  @Column('text')
  name!: string;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;
}

@Entity('memberships')
@Index('memberships_user', ['userId'])
@Check('memberships_roles_known', `roles <@ ARRAY['viewer','designer','engineer','reviewer','admin']`)
export class Membership {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid', { name: 'user_id' })
  userId!: string;

  @Column('text', { array: true })
  roles!: string[];

  @ManyToOne(() => Team)
  @JoinColumn({ name: 'team_id', foreignKeyConstraintName: 'memberships_team_fk' })
  team?: Relation<Team>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'user_id', foreignKeyConstraintName: 'memberships_user_fk' })
  user?: Relation<User>;
}

/** One signed-in browser. Only hashes of its refresh tokens are kept. */
@Entity('sessions')
@Index('sessions_user', ['userId'])
@Index('sessions_membership', ['teamId', 'userId'])
export class Session {
  @PrimaryColumn('uuid')
  id!: string;

  @Column('uuid', { name: 'user_id' })
  userId!: string;

  @Column('uuid', { name: 'team_id' })
  teamId!: string;

  @Column('text', { name: 'refresh_hash' })
  refreshHash!: string;

  @Column('text', { name: 'previous_refresh_hash', nullable: true })
  previousRefreshHash!: string | null;

  @Column('timestamptz', { name: 'rotated_at' })
  rotatedAt!: Date;

  @Column('timestamptz', { name: 'expires_at' })
  expiresAt!: Date;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;

  @ManyToOne(() => Membership, { onDelete: 'CASCADE' })
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'sessions_membership_fk' },
    { name: 'user_id', referencedColumnName: 'userId', foreignKeyConstraintName: 'sessions_membership_fk' },
  ])
  membership?: Relation<Membership>;
}

/** Wrong passwords by address typed, whether or not there is such a person: both are locked alike. */
@Entity('sign_in_failures')
export class SignInFailure {
  @PrimaryColumn('text', { name: 'email_key' })
  emailKey!: string;

  @Column('integer')
  failures!: number;

  @Column('timestamptz', { name: 'first_at' })
  firstAt!: Date;

  @Column('timestamptz', { name: 'locked_until', nullable: true })
  lockedUntil!: Date | null;
}

/** What administrators did; insert-only. */
@Entity('audit_entries')
@Index('audit_entries_team_at', ['teamId', 'at'])
@Index('audit_entries_actor', ['actorId'])
export class AuditEntry {
  @PrimaryColumn('uuid')
  id!: string;

  @Column('uuid', { name: 'team_id' })
  teamId!: string;

  @Column('uuid', { name: 'actor_id' })
  actorId!: string;

  @Column('text')
  kind!: string;

  @Column('jsonb')
  detail!: Record<string, unknown>;

  @Column('timestamptz')
  at!: Date;

  @ManyToOne(() => Team)
  @JoinColumn({ name: 'team_id', foreignKeyConstraintName: 'audit_entries_team_fk' })
  team?: Relation<Team>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'actor_id', foreignKeyConstraintName: 'audit_entries_actor_fk' })
  actor?: Relation<User>;
}
