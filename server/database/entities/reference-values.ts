import { Check, Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';

/** A shared material, finish, part type or rule set: what ships with the program. */
@Entity('reference_values')
@Index('reference_values_kind_slug_key', ['kind', 'slug'], { unique: true })
@Check('reference_values_kind_known', `kind IN ('material','finish','part-type','rule-set')`)
export class ReferenceValue {
  @PrimaryColumn('uuid')
  id!: string;

  @Column('text')
  kind!: string;

  @Column('text')
  slug!: string;
}

/** One immutable version of a shared value: a change inserts the next. */
@Entity('reference_value_versions')
@Index('reference_value_versions_value_number_key', ['valueId', 'number'], { unique: true })
@Check('reference_value_versions_number_positive', 'number >= 1')
export class ReferenceValueVersion {
  @PrimaryColumn('uuid')
  id!: string;

  @Column('uuid', { name: 'value_id' })
  valueId!: string;

  @Column('integer')
  number!: number;

  @Column('text')
  name!: string;

  @Column('jsonb')
  content!: Record<string, unknown>;

  @Column('text', { name: 'content_sha256' })
  contentSha256!: string;

  @Column('timestamptz', { name: 'created_at' })
  createdAt!: Date;

  @ManyToOne(() => ReferenceValue)
  @JoinColumn({ name: 'value_id', foreignKeyConstraintName: 'reference_value_versions_value_fk' })
  value?: Relation<ReferenceValue>;
}
