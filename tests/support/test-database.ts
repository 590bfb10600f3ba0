import { randomBytes } from 'node:crypto'

import { TEMPLATE_DATABASE, withConnection } from '@fieldfare/launcher'

import { atEndOfFile } from './end-of-file.ts'
import { readTestEnvironment } from './test-environment.ts'

export type TestDatabase = {
  /** Connection string; give it to the code under test as its FIELDFARE_DATABASE_URL. */
  readonly url: string
}

// Copies of one template are made one after the other: PostgreSQL refuses a template that is in use.
const TEMPLATE_LOCK = 4_300_001

/**
 * A fresh, migrated, empty database, dropped at the end of the test file even when connections are still open.
 * One in `beforeAll` per file is the usual way.
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `test_${randomBytes(8).toString('hex')}`
  const maintenanceUrl = readTestEnvironment('FIELDFARE_TEST_MAINTENANCE_URL')
  await withConnection(maintenanceUrl, async (client) => {
    await client.query('select pg_advisory_lock($1)', [TEMPLATE_LOCK])
    await client.query(`create database ${name} template ${TEMPLATE_DATABASE}`)
  })
  atEndOfFile(async () => {
    await withConnection(maintenanceUrl, (client) =>
      client.query(`drop database if exists ${name} with (force)`),
    )
  })
  const url = new URL(maintenanceUrl)
  url.pathname = `/${name}`
  return { url: url.href }
}
