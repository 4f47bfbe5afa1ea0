import { Column, CreateDateColumn, PrimaryGeneratedColumn, UpdateDateColumn, VersionColumn } from 'typeorm';

/** A row whose id and time of making the database gives. Times are kept to the millisecond, as JavaScript holds them. */
export abstract class KeptRow {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @CreateDateColumn({ type: 'timestamptz', precision: 3 }) createdAt!: Date;
}

/** A row that people edit: an edit of an older version answers 409. */
export abstract class VersionedRow extends KeptRow {
  @VersionColumn({ type: 'int' }) version!: number;
  @UpdateDateColumn({ type: 'timestamptz', precision: 3 }) updatedAt!: Date;
}

/** A row that can also lie in the bin, for 90 days. */
export abstract class EditableRow extends VersionedRow {
  @Column({ type: 'timestamptz', precision: 3, nullable: true }) deletedAt!: Date | null;
}
