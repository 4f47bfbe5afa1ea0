import { Check, Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import type { Item } from '../../../shared/contracts/item.js';
import { EditableRow } from './editable-row.js';
import { ProjectEntity } from './project.entity.js';

@Entity({ name: 'item' })
@Index(['projectId', 'createdAt', 'id'])
@Check('item_kind_check', `kind IN ('driver', 'box', 'part', 'jig')`)
export class ItemEntity extends EditableRow {
  @Column('uuid') projectId!: string;
  @ManyToOne(() => ProjectEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly project?: Relation<ProjectEntity>;
  @Column('text') kind!: Item['kind'];
  @Column('text') name!: string;
  @Column('text') serial!: string;
  @Column('text') note!: string;
  @Column('jsonb') published!: Item['published']; // as printed by the maker, SI, by figure id
}
