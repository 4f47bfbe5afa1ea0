import { runMigrations } from 'graphile-worker';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { startThrowAwayCluster } from '../../scripts/postgres.mjs';
import { makeDataSource } from '../../server/database/data-source.js';

declare module 'vitest' {
  interface ProvidedContext {
    clusterUrl: string; // of the cluster's own database: where the others are made from
    templateName: string; // a migrated, empty database to copy
  }
}

/** One throw-away PostgreSQL for the whole run, with a migrated template; each test file copies it. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const cluster = await startThrowAwayCluster();
  const templateName = 'template_migrated';
  const admin = new pg.Client(cluster.url);
  await admin.connect();
  await admin.query(`CREATE DATABASE ${templateName}`);
  await admin.end();

  const url = new URL(cluster.url);
  url.pathname = `/${templateName}`;
  const dataSource = await makeDataSource(url.href).initialize();
  await dataSource.runMigrations();
  await dataSource.destroy();
  await runMigrations({ connectionString: url.href });

  project.provide('clusterUrl', cluster.url);
  project.provide('templateName', templateName);
  return () => cluster.stop();
}
