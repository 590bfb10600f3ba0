import { readdir } from 'node:fs/promises'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'

import knex, { type Knex } from 'knex'
import { z } from 'zod'

const step = z.custom<Knex.Migration['up']>((value) => typeof value === 'function')
const migrationSchema = z.object({
  up: step,
  down: step.optional(),
  config: z.object({ transaction: z.boolean().optional() }).optional(),
})

/**
 * Brings the database to the newest migration and returns the names of those it ran. Names keep their `.ts`, exactly as
 * the knex command line stores them. Must run under tsx, since the migrations are TypeScript.
 */
export async function migrate(databaseUrl: string, directory: string): Promise<readonly string[]> {
  const database = knex({
    client: 'pg',
    connection: databaseUrl,
    pool: { min: 0, max: 2 },
    migrations: { migrationSource: migrationsIn(directory) },
  })
  try {
    const [, names] = z.tuple([z.number(), z.array(z.string())]).parse(await database.migrate.latest())
    return names
  } finally {
    await database.destroy()
  }
}

function migrationsIn(directory: string): Knex.MigrationSource<string> {
  return {
    getMigrations: async () => {
      const names = await readdir(directory)
      return names.filter((name) => name.endsWith('.ts')).sort()
    },
    getMigrationName: (name) => name,
    getMigration: async (name) => {
      const loaded: unknown = await import(pathToFileURL(join(directory, name)).href)
      const { up, down, config } = migrationSchema.parse(loaded)
      return {
        up,
        ...(down === undefined ? {} : { down }),
        ...(config?.transaction === undefined ? {} : { config: { transaction: config.transaction } }),
      }
    },
  }
}
