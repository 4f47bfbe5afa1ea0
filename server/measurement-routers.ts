import type { Router } from 'express';
import { SIZE_LIMIT_BYTES } from '../calculators/reading/size-limits.js';
import type { AppParts } from './app-parts.js';
import { EventHub } from './events/event-hub.js';
import { eventRouter } from './events/routes.js';
import { EventService } from './events/service.js';
import { PostgresFileStore } from './files/postgres-file-store.js';
import { limitSetRouter } from './limit-sets/routes.js';
import { LimitSetService } from './limit-sets/service.js';
import { ReadingPool } from './reading/reading-pool.js';
import { resultRouter } from './results/routes.js';
import { ResultService } from './results/service.js';
import { setupRouter } from './setups/routes.js';
import { SetupService } from './setups/service.js';
import { sheetRouter } from './sheets/routes.js';
import { SheetService } from './sheets/service.js';
import { sourceRouter } from './sources/routes.js';
import { SourceService } from './sources/service.js';
import { makeTemporaryFolder } from './sources/temporary-folder.js';
import { BatchService } from './sweeps/batches.js';
import { RevisionService } from './sweeps/revisions.js';
import { batchRouter, revisionRouter, sweepRouter } from './sweeps/routes.js';
import { SweepService } from './sweeps/service.js';

const BEAT_MS = 15_000;

/** The routers of measurement data, with the threads, the folder and the listener that end with the app. */
export function measurementRouters(parts: AppParts): Router[] {
  const { dataSource, access, onClose, limits, now } = parts;
  const files = new PostgresFileStore(dataSource);
  const folder = makeTemporaryFolder();
  const reader = new ReadingPool();
  const hub = new EventHub(parts.databaseUrl, parts.logger);
  onClose(() => hub.close());
  onClose(() => reader.close());
  onClose(() => folder.remove());
  const uploads = { folder: folder.path, fileBytes: SIZE_LIMIT_BYTES.text };
  const events = new EventService(dataSource, access, hub, { beatMs: parts.beatMs ?? BEAT_MS, now });
  return [
    sourceRouter(new SourceService(dataSource, access, files, reader), limits, uploads),
    sweepRouter(new SweepService(dataSource, access)),
    revisionRouter(new RevisionService(dataSource, access, files, reader, folder.path)),
    batchRouter(new BatchService(dataSource, access)),
    sheetRouter(new SheetService(dataSource, access)),
    resultRouter(new ResultService(dataSource, access)),
    setupRouter(new SetupService(dataSource, access)),
    limitSetRouter(new LimitSetService(dataSource, access)),
    eventRouter(events),
  ];
}
