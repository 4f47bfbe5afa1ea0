import type { DataSource } from 'typeorm';

/** Whether the database answers and has every migration that this server knows. */
export async function isDatabaseReady(dataSource: DataSource): Promise<boolean> {
  try {
    return !(await dataSource.showMigrations());
  } catch {
    return false;
  }
}
