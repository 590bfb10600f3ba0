import type { Database } from '../connection.ts'

/** Whether PostgreSQL answers at all. */
export async function pingDatabase(database: Database): Promise<void> {
  await database.raw('select 1')
}

/** Size on disk and version of the server. */
export async function readDatabaseDetails(
  database: Database,
): Promise<{ sizeBytes: number; version: string }> {
  const row: { sizeBytes: number; version: string } | undefined = await database.first(
    database.raw('pg_database_size(current_database())::float8 as "sizeBytes"'),
    database.raw("current_setting('server_version') as version"),
  )
  if (row === undefined) throw new Error('PostgreSQL told nothing of itself')
  return row
}
