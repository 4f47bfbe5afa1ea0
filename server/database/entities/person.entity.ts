import { Column, Entity, Unique } from 'typeorm';
import type { Preferences } from '../../../shared/contracts/account.js';
import { EditableRow } from './editable-row.js';

@Entity({ name: 'person' })
@Unique(['email'])
export class PersonEntity extends EditableRow {
  @Column('text') email!: string; // trimmed, lower case
  @Column('text') name!: string;
  @Column('text') passwordHash!: string; // argon2id, PHC string
  @Column({ type: 'timestamptz', precision: 3, nullable: true }) verifiedAt!: Date | null;
  @Column('jsonb') preferences!: Partial<Preferences>; // only what the person chose; the contract fills the rest
}
