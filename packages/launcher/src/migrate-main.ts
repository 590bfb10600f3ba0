import { join } from 'node:path'

import { migrate } from './migrate.ts'
import { REPOSITORY_DIRECTORY } from './repository-directory.ts'

const databaseUrl = process.env['FIELDFARE_DATABASE_URL']
if (databaseUrl === undefined) throw new Error('FIELDFARE_DATABASE_URL names the database to migrate.')

const names = await migrate(databaseUrl, join(REPOSITORY_DIRECTORY, 'migrations'))
for (const name of names) console.log(`Migrated ${name}`)
