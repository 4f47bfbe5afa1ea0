import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation, Unique } from 'typeorm';
import { KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';
import { ProjectEntity } from './project.entity.js';

/** A file as it came, byte for byte; the same content is kept once in a project. */
@Entity({ name: 'source_file' })
@Unique(['projectId', 'sha256'])
@Index(['createdById'])
export class SourceFileEntity extends KeptRow {
  @Column('uuid') projectId!: string;
  @ManyToOne(() => ProjectEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly project?: Relation<ProjectEntity>;
  @Column('text') fileName!: string;
  @Column('int') bytes!: number; // at most 1 GB
  @Column('char', { length: 64 }) sha256!: string; // hex
  @Column('uuid') createdById!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'NO ACTION' }) @JoinColumn() readonly createdBy?: Relation<PersonEntity>;
}

/** The bytes of a source file in rows of 1 MB, so that neither side ever holds the whole of a large one. */
@Entity({ name: 'source_chunk' })
export class SourceChunkEntity {
  @PrimaryColumn('uuid') sourceFileId!: string;
  @PrimaryColumn('int') position!: number; // 0, 1, 2 …
  @ManyToOne(() => SourceFileEntity, { onDelete: 'CASCADE' })
  @JoinColumn()
  readonly sourceFile?: Relation<SourceFileEntity>;
  @Column('bytea') content!: Buffer;
}
