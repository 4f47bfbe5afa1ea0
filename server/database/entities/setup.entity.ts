import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation, Unique } from 'typeorm';
import { EditableRow, KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';
import { TeamEntity } from './team.entity.js';

@Entity({ name: 'setup' })
@Index('setup_team_id_name_live_key', ['teamId', 'name'], { unique: true, where: 'deleted_at IS NULL' })
@Index(['teamId', 'createdAt', 'id'])
export class SetupEntity extends EditableRow {
  @Column('uuid') teamId!: string;
  @ManyToOne(() => TeamEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly team?: Relation<TeamEntity>;
  @Column('text') name!: string;
  @Column('text') calculatorId!: string;
}

/** Never changed: publishing makes the next number. */
@Entity({ name: 'setup_version' })
@Unique(['setupId', 'number'])
@Index(['createdById'])
export class SetupVersionEntity extends KeptRow {
  @Column('uuid') setupId!: string;
  @ManyToOne(() => SetupEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly setup?: Relation<SetupEntity>;
  @Column('int') number!: number;
  @Column('text') calculatorId!: string;
  @Column('int') calculatorVersion!: number;
  @Column('jsonb') settings!: Record<string, unknown>;
  @Column('int') settingsVersion!: number;
  @Column('text') note!: string;
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}
