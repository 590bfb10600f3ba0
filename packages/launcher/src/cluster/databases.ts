import { Client, escapeIdentifier } from 'pg'

import type { Cluster } from './cluster.ts'

/** Creates the database unless it exists; tells whether it did create it. */
export async function ensureDatabase(cluster: Pick<Cluster, 'databaseUrl'>, name: string): Promise<boolean> {
  return withConnection(cluster.databaseUrl('postgres'), async (client) => {
    const found = await client.query('select 1 from pg_database where datname = $1', [name])
    if (found.rows.length > 0) return false
    await client.query(`create database ${escapeIdentifier(name)}`)
    return true
  })
}

/** Drops the database with everything in it, ending whoever is connected. */
export async function dropDatabase(cluster: Pick<Cluster, 'databaseUrl'>, name: string): Promise<void> {
  await withConnection(cluster.databaseUrl('postgres'), (client) =>
    client.query(`drop database if exists ${escapeIdentifier(name)} with (force)`),
  )
}

/** Runs `work` on one connection and closes it, whatever happens. */
export async function withConnection<Result>(
  databaseUrl: string,
  work: (client: Client) => Promise<Result>,
): Promise<Result> {
  const client = new Client({ connectionString: databaseUrl })
  await client.connect()
  try {
    return await work(client)
  } finally {
    await client.end()
  }
}
