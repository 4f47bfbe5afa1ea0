import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Counters of the rate limits, shared by all servers; the columns are those that rate-limiter-flexible asks for. */
@Entity({ name: 'rate_limit' })
export class RateLimitEntity {
  @PrimaryColumn('text') key!: string;
  @Column('int') points!: number;
  @Column('bigint', { nullable: true }) expire!: string | null; // ms since 1970
}
