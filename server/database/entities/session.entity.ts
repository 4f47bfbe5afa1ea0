import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import { KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';

/**
 * One device signed in: a family of refresh tokens. A token is derived from id, generation and salt with the server's
 * secret, so nothing that opens a session is at rest here.
 */
@Entity({ name: 'session' })
@Index(['personId'])
export class SessionEntity extends KeptRow {
  @Column('uuid') personId!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly person?: Relation<PersonEntity>;
  @Column('text') device!: string; // from the user agent, in words
  @Column('text') salt!: string;
  @Column('int') generation!: number; // of the newest refresh token
  @Column({ type: 'timestamptz', precision: 3 }) rotatedAt!: Date;
  @Column({ type: 'timestamptz', precision: 3 }) lastUsedAt!: Date;
  @Column({ type: 'timestamptz', precision: 3 }) expiresAt!: Date;
  @Column({ type: 'timestamptz', precision: 3, nullable: true }) endedAt!: Date | null;
}
