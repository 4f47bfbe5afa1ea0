import { Check, Column, Entity, Index, JoinColumn, ManyToOne, type Relation, Unique } from 'typeorm';
import type { Role } from '../../../shared/contracts/team.js';
import { EditableRow, VersionedRow } from './editable-row.js';
import { PersonEntity } from './person.entity.js';

@Entity({ name: 'team' })
export class TeamEntity extends EditableRow {
  @Column('text') name!: string;
  @Column('jsonb') rules!: Record<string, unknown>; // what the team has decided for itself; empty: the product's defaults
}

@Entity({ name: 'membership' })
@Unique(['teamId', 'personId'])
@Index(['personId'])
@Check('membership_role_check', `role IN ('owner', 'lead', 'member', 'viewer')`)
export class MembershipEntity extends VersionedRow {
  @Column('uuid') teamId!: string;
  @ManyToOne(() => TeamEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly team?: Relation<TeamEntity>;
  @Column('uuid') personId!: string;
  @ManyToOne(() => PersonEntity, { onDelete: 'CASCADE' }) @JoinColumn() readonly person?: Relation<PersonEntity>;
  @Column('text') role!: Role;
}
