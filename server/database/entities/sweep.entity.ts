import { Column, Entity, Index, JoinColumn, ManyToOne, OneToOne, PrimaryColumn, type Relation, Unique } from 'typeorm';
import type { Reading, ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { SweepConditions } from '../../../shared/contracts/sweep.js';
import type { Finding } from '../../../shared/output.js';
import { EditableRow, KeptRow } from './editable-row.js';
import { ItemEntity } from './item.entity.js';
import { PersonEntity } from './person.entity.js';
import { ProjectEntity } from './project.entity.js';
import { SourceFileEntity } from './source-file.entity.js';

@Entity({ name: 'sweep' })
@Index(['projectId', 'createdAt', 'id'])
@Index(['projectId', 'batchId'])
@Index(['itemId'])
@Index('sweep_source_file_live_key', ['sourceFileId'], { unique: true, where: 'deleted_at IS NULL' })
@Index(['sourceFileId'])
export class SweepEntity extends EditableRow {
  @Column('uuid') projectId!: string;
  @ManyToOne(() => ProjectEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly project?: Relation<ProjectEntity>;
  @Column('uuid', { nullable: true }) itemId!: string | null;
  @ManyToOne(() => ItemEntity, { onDelete: 'SET NULL' }) @JoinColumn() readonly item?: Relation<ItemEntity> | null;
  @Column('uuid') sourceFileId!: string;
  @ManyToOne(() => SourceFileEntity, { onDelete: 'CASCADE' })
  @JoinColumn()
  readonly sourceFile?: Relation<SourceFileEntity>;
  @Column('uuid') batchId!: string; // one drop of files: undo removes it whole
  @Column('text') name!: string;
  @Column('jsonb') conditions!: SweepConditions;
  @Column('text') groupName!: string;
  @Column('text', { array: true }) tags!: string[];
  @Column('int') newestRevision!: number; // number of the newest reading
}

/** One reading of the source file. Never changed: another reading is another revision. */
@Entity({ name: 'sweep_revision' })
@Unique(['sweepId', 'number'])
@Index(['createdById'])
export class SweepRevisionEntity extends KeptRow {
  @Column('uuid') sweepId!: string;
  @ManyToOne(() => SweepEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly sweep?: Relation<SweepEntity>;
  @Column('int') number!: number;
  @Column('jsonb') overrides!: ReadingOverrides; // what a person told; the rest was guessed
  @Column('jsonb') reading!: Reading;
  @Column('jsonb') findings!: Finding[];
  @Column('boolean') hasPhase!: boolean;
  @Column('int') points!: number;
  @Column('float8') minFrequencyHz!: number;
  @Column('float8') maxFrequencyHz!: number;
  @Column('char', { length: 64 }) pointsSha256!: string;
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}

/** The canonical points, planar little-endian float64, in a table of its own: lists never load a curve. */
@Entity({ name: 'sweep_points' })
export class SweepPointsEntity {
  @PrimaryColumn('uuid') revisionId!: string;
  @OneToOne(() => SweepRevisionEntity, { onDelete: 'CASCADE' })
  @JoinColumn()
  readonly revision?: Relation<SweepRevisionEntity>;
  @Column('bytea') content!: Buffer;
}
