import type { DataSource, EntityManager } from 'typeorm';
import { recordChange } from '../activity/record-change.js';
import { ActivityEntity } from '../database/entities/activity.entity.js';
import { fillBench } from './bench.js';
import { DEMO_PASSWORD, DEMO_PEOPLE, demoPeople } from './people.js';

export interface DemoSignIn {
  readonly email: string;
  readonly password: string;
}
const LOCK = 4_180_613; // any number, the same on every server

/**
 * Fills an installation with the invented school, once: whoever deletes something of it does not find it again after
 * the next start. Servers that start together wait for each other, and a seed that was interrupted goes on where it
 * stopped. Answers the first person's sign-in.
 */
export async function seedDemo(dataSource: DataSource): Promise<DemoSignIn> {
  const runner = dataSource.createQueryRunner();
  try {
    await runner.connect();
    await runner.query('SELECT pg_advisory_lock($1)', [LOCK]);
    try {
      if (!(await wasSeeded(dataSource.manager))) await seed(dataSource);
    } finally {
      await runner.query('SELECT pg_advisory_unlock($1)', [LOCK]);
    }
  } finally {
    await runner.release();
  }
  return { email: DEMO_PEOPLE[0]!.email, password: DEMO_PASSWORD };
}

function wasSeeded(manager: EntityManager): Promise<boolean> {
  return manager.existsBy(ActivityEntity, { action: 'demo:seed' });
}

async function seed(dataSource: DataSource): Promise<void> {
  const { actors, teamId } = await dataSource.transaction(demoPeople);
  const counts = await fillBench(dataSource, actors, teamId);
  await dataSource.transaction((manager) =>
    recordChange(manager, {
      ...{ actor: null, action: 'demo:seed', entity: 'team', entityId: teamId, version: 1, teamId, projectId: null },
      ...{ from: null, to: counts },
    }),
  );
}
