import { DataSource } from 'typeorm';
import { ActivityEntity, ActivityHeadEntity } from './entities/activity.entity.js';
import { ItemEntity } from './entities/item.entity.js';
import { LimitSetEntity, LimitVersionEntity } from './entities/limit-set.entity.js';
import { MailCodeEntity } from './entities/mail-code.entity.js';
import { NoticeEntity } from './entities/notice.entity.js';
import { PersonEntity } from './entities/person.entity.js';
import { ProjectEntity } from './entities/project.entity.js';
import { RateLimitEntity } from './entities/rate-limit.entity.js';
import { ResultEntity } from './entities/result.entity.js';
import { SessionEntity } from './entities/session.entity.js';
import { SetupEntity, SetupVersionEntity } from './entities/setup.entity.js';
import { SheetEntity } from './entities/sheet.entity.js';
import { SourceChunkEntity, SourceFileEntity } from './entities/source-file.entity.js';
import { SweepEntity, SweepPointsEntity, SweepRevisionEntity } from './entities/sweep.entity.js';
import { MembershipEntity, TeamEntity } from './entities/team.entity.js';
import { FirstTables1764586800000 } from './migrations/1764586800000-first-tables.js';
import { SnakeNamingStrategy } from './naming-strategy.js';

export const ENTITIES = [
  PersonEntity,
  SessionEntity,
  MailCodeEntity,
  TeamEntity,
  MembershipEntity,
  ProjectEntity,
  ItemEntity,
  SourceFileEntity,
  SourceChunkEntity,
  SweepEntity,
  SweepRevisionEntity,
  SweepPointsEntity,
  SheetEntity,
  SetupEntity,
  SetupVersionEntity,
  LimitSetEntity,
  LimitVersionEntity,
  ResultEntity,
  ActivityEntity,
  ActivityHeadEntity,
  NoticeEntity,
  RateLimitEntity,
];

/** In the order they run; a merged one is never edited. */
export const MIGRATIONS = [FirstTables1764586800000];

export function makeDataSource(url: string, connections = 10): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: ENTITIES,
    migrations: MIGRATIONS,
    migrationsTableName: 'migration',
    migrationsTransactionMode: 'each',
    namingStrategy: new SnakeNamingStrategy(),
    synchronize: false,
    uuidExtension: 'pgcrypto',
    installExtensions: false,
    applicationName: 'hummock',
    extra: { max: connections },
  });
}
