import { Check, Column, Entity, Index, PrimaryColumn } from 'typeorm';

export const CHANGES = ['made', 'changed', 'deleted', 'restored'] as const;
export type Change = (typeof CHANGES)[number];

/**
 * One change, chained by hash to the one before. A chain belongs to a team, or to a person for what concerns only
 * their account. No foreign keys on purpose: history outlives what it names, and a nulled reference would break it.
 */
@Entity({ name: 'activity' })
@Index(['projectId', 'sequence'])
@Index(['entityId'])
@Check('activity_change_check', `change IN ('made', 'changed', 'deleted', 'restored')`)
export class ActivityEntity {
  @PrimaryColumn('uuid') chainId!: string;
  @PrimaryColumn('int') sequence!: number; // 1, 2, 3 … within the chain, in the order of commits
  @Column({ type: 'timestamptz', precision: 3 }) at!: Date;
  @Column('uuid', { nullable: true }) actorId!: string | null; // null: the product itself
  @Column('text') action!: string; // noun:verb
  @Column('text') entity!: string;
  @Column('uuid') entityId!: string;
  @Column('int') entityVersion!: number;
  @Column('text') change!: Change;
  @Column('uuid', { nullable: true }) projectId!: string | null;
  @Column('jsonb', { nullable: true }) from!: Record<string, unknown> | null;
  @Column('jsonb', { nullable: true }) to!: Record<string, unknown> | null;
  @Column('char', { length: 64 }) previousHash!: string;
  @Column('char', { length: 64 }) hash!: string;
}

/** The end of a chain. Its row lock puts the changes of a chain in one order; its hash shows a tail that was cut. */
@Entity({ name: 'activity_head' })
export class ActivityHeadEntity {
  @PrimaryColumn('uuid') chainId!: string;
  @Column('int') sequence!: number;
  @Column('char', { length: 64 }) hash!: string;
}
