import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation, Unique } from 'typeorm';
import type { LimitSet } from '../../../shared/contracts/limit-set.js';
import { EditableRow, KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';
import { TeamEntity } from './team.entity.js';

@Entity({ name: 'limit_set' })
@Index('limit_set_team_id_name_live_key', ['teamId', 'name'], { unique: true, where: 'deleted_at IS NULL' })
@Index(['teamId', 'createdAt', 'id'])
export class LimitSetEntity extends EditableRow {
  @Column('uuid') teamId!: string;
  @ManyToOne(() => TeamEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly team?: Relation<TeamEntity>;
  @Column('text') name!: string;
}

/** Never changed: publishing makes the next number. */
@Entity({ name: 'limit_version' })
@Unique(['limitSetId', 'number'])
@Index(['createdById'])
export class LimitVersionEntity extends KeptRow {
  @Column('uuid') limitSetId!: string;
  @ManyToOne(() => LimitSetEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly limitSet?: Relation<LimitSetEntity>;
  @Column('int') number!: number;
  @Column('jsonb') content!: LimitSet['newest']['content'];
  @Column('text') note!: string;
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}
