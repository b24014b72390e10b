import { Check, Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { Assembly, Revision } from './assemblies.js';
import { User } from './people.js';

const states = `'asked','accepted','accepted-with-conditions','returned','declined','withdrawn','superseded','self-checked'`;

/** Where a derating decision stands now; what happened is in its events. */
@Entity('decisions')
@Index('decisions_number_key', ['teamId', 'number'], { unique: true })
@Index('decisions_assembly', ['teamId', 'assemblyId'])
@Index('decisions_revision', ['teamId', 'revisionId'])
@Index('decisions_state', ['teamId', 'state'])
@Index('decisions_asked_by', ['askedBy'])
@Index('decisions_decided_by', ['decidedBy'])
@Index('decisions_request_key', ['teamId', 'askedBy', 'requestId'], { unique: true })
@Index('decisions_one_waiting', ['teamId', 'assemblyId'], { unique: true, where: `state = 'asked'` })
@Check('decisions_state_known', `state IN (${states})`)
@Check('decisions_decided_whole', `(decided_by IS NULL) = (decided_at IS NULL)`)
@Check(
  'decisions_decided_by_somebody',
  `state NOT IN ('accepted','accepted-with-conditions','returned','declined') OR decided_by IS NOT NULL`,
)
export class Decision {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid')
  id!: string;

  @Column('integer')
  number!: number;

  @Column('integer')
  version!: number;

  @Column('text')
  state!: string;

  @Column('uuid', { name: 'assembly_id' })
  assemblyId!: string;

  @Column('uuid', { name: 'revision_id' })
  revisionId!: string;

  @Column('text')
  statement!: string;

  @Column('jsonb')
  covers!: Record<string, unknown>;

  /** What binds, ceiling and drive of the frozen snapshot, for the register. */
  @Column('jsonb')
  outline!: Record<string, unknown>;

  @Column('uuid', { name: 'asked_by' })
  askedBy!: string;

  @Column('timestamptz', { name: 'asked_at' })
  askedAt!: Date;

  @Column('uuid', { name: 'decided_by', nullable: true })
  decidedBy!: string | null;

  @Column('timestamptz', { name: 'decided_at', nullable: true })
  decidedAt!: Date | null;

  @Column('uuid', { name: 'request_id', nullable: true })
  requestId!: string | null;

  @ManyToOne(() => Assembly)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'decisions_assembly_fk' },
    { name: 'assembly_id', referencedColumnName: 'id', foreignKeyConstraintName: 'decisions_assembly_fk' },
  ])
  assembly?: Relation<Assembly>;

  @ManyToOne(() => Revision)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'decisions_revision_fk' },
    { name: 'revision_id', referencedColumnName: 'id', foreignKeyConstraintName: 'decisions_revision_fk' },
  ])
  revision?: Relation<Revision>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'asked_by', foreignKeyConstraintName: 'decisions_asked_by_fk' })
  asker?: Relation<User>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'decided_by', foreignKeyConstraintName: 'decisions_decided_by_fk' })
  decider?: Relation<User>;
}

/** What happened to a decision, numbered per team without gaps; insert-only. */
@Entity('decision_events')
@Index('decision_events_decision', ['teamId', 'decisionId'])
@Index('decision_events_revision', ['teamId', 'revisionId'])
@Index('decision_events_actor', ['actorId'])
@Check('decision_events_kind_known', `kind IN (${states})`)
@Check('decision_events_sequence_positive', 'sequence >= 1')
@Check('decision_events_snapshot_whole', '(snapshot IS NULL) = (snapshot_sha256 IS NULL)')
export class DecisionEvent {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('integer')
  sequence!: number;

  @Column('uuid', { name: 'decision_id' })
  decisionId!: string;

  @Column('text')
  kind!: string;

  @Column('uuid', { name: 'actor_id' })
  actorId!: string;

  @Column('timestamptz')
  at!: Date;

  @Column('text')
  reason!: string;

  @Column('jsonb')
  conditions!: unknown[];

  @Column('jsonb', { name: 'flags_taken' })
  flagsTaken!: unknown[];

  @Column('uuid', { name: 'revision_id', nullable: true })
  revisionId!: string | null;

  /** Canonical JSON (RFC 8785) of what was asked on, and its SHA-256. Text, since its bytes are what is hashed. */
  @Column('text', { nullable: true })
  snapshot!: string | null;

  @Column('text', { name: 'snapshot_sha256', nullable: true })
  snapshotSha256!: string | null;

  @ManyToOne(() => Decision)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'decision_events_decision_fk' },
    { name: 'decision_id', referencedColumnName: 'id', foreignKeyConstraintName: 'decision_events_decision_fk' },
  ])
  decision?: Relation<Decision>;

  @ManyToOne(() => Revision)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'decision_events_revision_fk' },
    { name: 'revision_id', referencedColumnName: 'id', foreignKeyConstraintName: 'decision_events_revision_fk' },
  ])
  revision?: Relation<Revision>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'actor_id', foreignKeyConstraintName: 'decision_events_actor_fk' })
  actor?: Relation<User>;
}
