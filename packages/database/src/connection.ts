import knex, { type Knex } from 'knex'
import { TypeOverrides } from 'pg'

/** The pool. Repositories take it as their first argument when they only read. */
export type Database = Knex
/** An open transaction. Whatever writes takes it as its first argument. */
export type Transaction = Knex.Transaction
/** Either: for reads that may be part of a transaction. */
export type Connection = Database | Transaction

const POSTGRES_INT8 = 20
const POSTGRES_DATE = 1082
const POSTGRES_TIMESTAMPTZ = 1184

function instantFromPostgres(text: string): string {
  const moment = new Date(text)
  if (Number.isNaN(moment.getTime())) throw new Error(`PostgreSQL sent a time that is no instant: ${text}`)
  return moment.toISOString()
}

const asText = (text: string) => text

/**
 * Per connection and never global, so nothing else in the process that uses `pg` changes its meaning:
 * bigint → bigint, timestamptz → ISO instant in UTC, date → YYYY-MM-DD.
 */
function createTypeParsers(): Knex.PgCustomTypesConfig {
  const overrides = new TypeOverrides()
  overrides.setTypeParser(POSTGRES_INT8, (text) => BigInt(text))
  overrides.setTypeParser(POSTGRES_DATE, asText)
  overrides.setTypeParser(POSTGRES_TIMESTAMPTZ, instantFromPostgres)
  return {
    getTypeParser: (oid, format) => overrides.getTypeParser(oid, format === 'binary' ? 'binary' : 'text'),
  }
}

export type DatabaseOptions = {
  databaseUrl: string
  /** Shown by pg_stat_activity, so that a stuck session can be traced to its process. */
  applicationName: string
  poolSize?: number
}

/** Opens a pool. Nothing connects until the first query; close it with `database.destroy()`. */
export function createDatabase(options: DatabaseOptions): Database {
  return knex({
    client: 'pg',
    connection: {
      connectionString: options.databaseUrl,
      application_name: options.applicationName,
      types: createTypeParsers(),
      options: '-c timezone=UTC',
    },
    pool: { min: 0, max: options.poolSize ?? 10 },
    acquireConnectionTimeout: 15_000,
  })
}
