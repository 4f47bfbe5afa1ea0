import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';

/** A database of the test file's own: a copy of the migrated template, or empty. */
export async function makeDatabase({ migrated = true } = {}): Promise<{ url: string; drop: () => Promise<void> }> {
  const clusterUrl = inject('clusterUrl');
  const name = `test_${randomBytes(6).toString('hex')}`;
  const onCluster = async (statement: string) => {
    const client = new pg.Client(clusterUrl);
    await client.connect();
    await client.query(statement).finally(() => client.end());
  };
  await onCluster(`CREATE DATABASE ${name}${migrated ? ` TEMPLATE ${inject('templateName')}` : ''}`);
  const url = new URL(clusterUrl);
  url.pathname = `/${name}`;
  return { url: url.href, drop: () => onCluster(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`) };
}
