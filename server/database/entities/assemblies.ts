import { Check, Column, Entity, Index, JoinColumn, ManyToOne, OneToOne, PrimaryColumn, type Relation } from 'typeorm';
import { Team, User } from './people.js';

@Entity('assemblies')
@Index('assemblies_created_by', ['createdBy'])
@Index('assemblies_duplicated_from', ['teamId', 'duplicatedFrom'])
@Index('assemblies_request_key', ['teamId', 'createdBy', 'requestId'], { unique: true })
export class Assembly {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid')
  id!: string;

  @Column('text')
  name!: string;

  @Column('uuid', { name: 'created_by' })
  createdBy!: string;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;

  @Column('timestamptz', { name: 'archived_at', nullable: true })
  archivedAt!: Date | null;

  @Column('uuid', { name: 'duplicated_from', nullable: true })
  duplicatedFrom!: string | null;

  /** Named by the client per press of the button, so that a repeated send makes one. */
  @Column('uuid', { name: 'request_id', nullable: true })
  requestId!: string | null;

  @ManyToOne(() => Assembly)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'assemblies_duplicated_from_fk' },
    { name: 'duplicated_from', referencedColumnName: 'id', foreignKeyConstraintName: 'assemblies_duplicated_from_fk' },
  ])
  original?: Relation<Assembly> | null;

  @ManyToOne(() => Team)
  @JoinColumn({ name: 'team_id', foreignKeyConstraintName: 'assemblies_team_fk' })
  team?: Relation<Team>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'created_by', foreignKeyConstraintName: 'assemblies_created_by_fk' })
  creator?: Relation<User>;
}

/** The one draft of an assembly, exactly as typed. */
@Entity('assembly_drafts')
@Index('assembly_drafts_updated_by', ['updatedBy'])
@Index('assembly_drafts_updated_at', ['teamId', 'updatedAt'])
@Check('assembly_drafts_version_positive', 'version >= 1')
export class AssemblyDraft {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid', { name: 'assembly_id' })
  assemblyId!: string;

  @Column('integer')
  version!: number;

  @Column('jsonb')
  document!: Record<string, unknown>;

  @Column('uuid', { name: 'updated_by' })
  updatedBy!: string;

  @Column('timestamptz', { name: 'updated_at' })
  updatedAt!: Date;

  /** Verdict on `verdictVersion` of this draft; null while that cannot be computed. */
  @Column('jsonb', { nullable: true })
  verdict!: Record<string, unknown> | null;

  @Column('integer', { name: 'verdict_version', nullable: true })
  verdictVersion!: number | null;

  @Column('text', { name: 'verdict_engine', nullable: true })
  verdictEngine!: string | null;

  @OneToOne(() => Assembly)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'assembly_drafts_assembly_fk' },
    { name: 'assembly_id', referencedColumnName: 'id', foreignKeyConstraintName: 'assembly_drafts_assembly_fk' },
  ])
  assembly?: Relation<Assembly>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'updated_by', foreignKeyConstraintName: 'assembly_drafts_updated_by_fk' })
  updater?: Relation<User>;
}

/** Who changed an assembly, when and in which version of its draft last: who did is not independent. */
@Entity('assembly_contributions')
@Index('assembly_contributions_user', ['userId'])
export class AssemblyContribution {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid', { name: 'assembly_id' })
  assemblyId!: string;

  @PrimaryColumn('uuid', { name: 'user_id' })
  userId!: string;

  @Column('timestamptz', { name: 'last_edited_at' })
  lastEditedAt!: Date;

  @Column('integer', { name: 'last_version' })
  lastVersion!: number;

  @ManyToOne(() => Assembly)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'assembly_contributions_assembly_fk' },
    { name: 'assembly_id', referencedColumnName: 'id', foreignKeyConstraintName: 'assembly_contributions_assembly_fk' },
  ])
  assembly?: Relation<Assembly>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'user_id', foreignKeyConstraintName: 'assembly_contributions_user_fk' })
  user?: Relation<User>;
}

/** An immutable numbered copy of the draft; insert-only. */
@Entity('revisions')
@Index('revisions_assembly_number_key', ['teamId', 'assemblyId', 'number'], { unique: true })
@Index('revisions_created_by', ['createdBy'])
@Check('revisions_number_positive', 'number >= 1')
export class Revision {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid')
  id!: string;

  @Column('uuid', { name: 'assembly_id' })
  assemblyId!: string;

  @Column('integer')
  number!: number;

  @Column('jsonb')
  document!: Record<string, unknown>;

  @Column('integer', { name: 'draft_version' })
  draftVersion!: number;

  @Column('text')
  note!: string;

  @Column('text', { name: 'engine_version' })
  engineVersion!: string;

  @Column('uuid', { name: 'created_by' })
  createdBy!: string;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;

  @ManyToOne(() => Assembly)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'revisions_assembly_fk' },
    { name: 'assembly_id', referencedColumnName: 'id', foreignKeyConstraintName: 'revisions_assembly_fk' },
  ])
  assembly?: Relation<Assembly>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'created_by', foreignKeyConstraintName: 'revisions_created_by_fk' })
  creator?: Relation<User>;
}

/** Who had a hand in a revision since the last accepted decision; insert-only. */
@Entity('revision_contributors')
@Index('revision_contributors_user', ['userId'])
export class RevisionContributor {
  @PrimaryColumn('uuid', { name: 'team_id' })
  teamId!: string;

  @PrimaryColumn('uuid', { name: 'revision_id' })
  revisionId!: string;

  @PrimaryColumn('uuid', { name: 'user_id' })
  userId!: string;

  @ManyToOne(() => Revision)
  @JoinColumn([
    { name: 'team_id', referencedColumnName: 'teamId', foreignKeyConstraintName: 'revision_contributors_revision_fk' },
    { name: 'revision_id', referencedColumnName: 'id', foreignKeyConstraintName: 'revision_contributors_revision_fk' },
  ])
  revision?: Relation<Revision>;

  @ManyToOne(() => User)
  @JoinColumn({ name: 'user_id', foreignKeyConstraintName: 'revision_contributors_user_fk' })
  user?: Relation<User>;
}
