import { Check, Column, Entity, Index, JoinColumn, ManyToOne, type Relation, Unique } from 'typeorm';
import { KeptRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';

/** A code sent by mail, to prove an address or to set a new password: used once, short-lived, hashed at rest. */
@Entity({ name: 'mail_code' })
@Unique(['codeSha256'])
@Index(['personId'])
@Check('mail_code_purpose_check', `purpose IN ('verify', 'reset')`)
export class MailCodeEntity extends KeptRow {
  @Column('uuid') personId!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly person?: Relation<PersonEntity>;
  @Column('text') purpose!: 'verify' | 'reset';
  @Column('char', { length: 64 }) codeSha256!: string;
  @Column({ type: 'timestamptz', precision: 3 }) expiresAt!: Date;
  @Column({ type: 'timestamptz', precision: 3, nullable: true }) usedAt!: Date | null;
}
