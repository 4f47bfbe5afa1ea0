import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import type { Result } from '../../../shared/contracts/result.js';
import type { Output } from '../../../shared/output.js';
import { EditableRow } from './editable-row.js';
import { ItemEntity } from './item.entity.js';
import { PersonEntity } from './person.entity.js';
import { ProjectEntity } from './project.entity.js';
import { SetupVersionEntity } from './setup.entity.js';
import { SheetEntity } from './sheet.entity.js';

/** What one run produced, with all that went in. A setup version that a result names cannot be removed. */
@Entity({ name: 'result' })
@Index(['projectId', 'createdAt', 'id'])
@Index(['sheetId'])
@Index(['itemId'])
@Index(['setupVersionId'])
@Index(['createdById'])
export class ResultEntity extends EditableRow {
  @Column('uuid') projectId!: string;
  @ManyToOne(() => ProjectEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly project?: Relation<ProjectEntity>;
  @Column('uuid', { nullable: true }) sheetId!: string | null;
  @ManyToOne(() => SheetEntity, { onDelete: 'SET NULL' }) @JoinColumn() readonly sheet?: Relation<SheetEntity> | null;
  @Column('uuid', { nullable: true }) itemId!: string | null;
  @ManyToOne(() => ItemEntity, { onDelete: 'SET NULL' }) @JoinColumn() readonly item?: Relation<ItemEntity> | null;
  @Column('text') name!: string;
  @Column('text') calculatorId!: string;
  @Column('int') calculatorVersion!: number;
  @Column('jsonb') settings!: Record<string, unknown>;
  @Column('int') settingsVersion!: number;
  @Column('uuid', { nullable: true }) setupVersionId!: string | null;
  @ManyToOne(() => SetupVersionEntity, { onDelete: 'NO ACTION' })
  @JoinColumn()
  readonly setupVersion?: Relation<SetupVersionEntity> | null;
  @Column('int') seed!: number;
  @Column('jsonb') inputs!: Result['inputs'];
  @Column('jsonb') output!: Output;
  @Column('char', { length: 64 }) inputsSha256!: string;
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}
