import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import { EditableRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';
import { TeamEntity } from './team.entity.js';

@Entity({ name: 'project' })
@Index(['teamId', 'createdAt', 'id'])
@Index(['createdById'])
export class ProjectEntity extends EditableRow {
  @Column('uuid') teamId!: string;
  @ManyToOne(() => TeamEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly team?: Relation<TeamEntity>;
  @Column('text') name!: string;
  @Column('text') note!: string;
  @Column('boolean') isInvented!: boolean; // the demo: anyone signed in may look at it
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}
