import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import type { SheetContent } from '../../../shared/contracts/sheet.js';
import { EditableRow } from './editable-row.js';
import { ProjectEntity } from './project.entity.js';

@Entity({ name: 'sheet' })
@Index(['projectId', 'createdAt', 'id'])
export class SheetEntity extends EditableRow {
  @Column('uuid') projectId!: string;
  @ManyToOne(() => ProjectEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly project?: Relation<ProjectEntity>;
  @Column('text') name!: string;
  @Column('jsonb') content!: SheetContent;
}
