import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import { KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';
import { TeamEntity } from './team.entity.js';

/** Something one person should know: a new device signed in, a run ended. */
@Entity({ name: 'notice' })
@Index(['personId', 'createdAt', 'id'])
@Index(['teamId'])
export class NoticeEntity extends KeptRow {
  @Column('uuid') personId!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly person?: Relation<PersonEntity>;
  @Column('uuid', { nullable: true }) teamId!: string | null;
  @ManyToOne(() => TeamEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly team?: Relation<TeamEntity> | null;
  @Column('text') kind!: string;
  @Column('jsonb') subject!: Record<string, unknown>;
  @Column({ type: 'timestamptz', precision: 3, nullable: true }) readAt!: Date | null;
}
