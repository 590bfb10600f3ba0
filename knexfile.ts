import type { Knex } from 'knex'

/**
 * For the knex command line only: `npx tsx node_modules/knex/bin/cli.js migrate:make describe_the_effect`.
 * Start-up and the tests migrate through the launcher, with the same directory and the same `.ts` file names.
 */
const configuration: Knex.Config = {
  client: 'pg',
  connection: process.env['FIELDFARE_DATABASE_URL'] ?? '',
  migrations: { directory: './migrations', loadExtensions: ['.ts'], extension: 'ts' },
  seeds: { directory: './seeds', loadExtensions: ['.ts'], extension: 'ts' },
}

export default configuration
