import { existsSync } from 'node:fs'
import { writeFile } from 'node:fs/promises'
import { join } from 'node:path'

import pg from 'pg'

/** Stands in for the demo: writes one play; with a file called `hang` in the data directory it then never ends. */
export async function seedDemo({ log }: { readonly log: (line: string) => void }): Promise<void> {
  const directory = process.env['FIELDFARE_DATA_DIR'] ?? '.'
  const client = new pg.Client({ connectionString: process.env['FIELDFARE_DATABASE_URL'] })
  await client.connect()
  await client.query("insert into plays (title) values ('Morning Tide')")
  await client.end()
  log('1 of 1 plays')
  if (existsSync(join(directory, 'hang'))) await new Promise((resolve) => setTimeout(resolve, 600_000))
  const signIns = [{ role: 'clerk', email: 'clerk@desk.example', password: 'tide-morning-42' }]
  await writeFile(join(directory, 'demo-sign-ins.json'), JSON.stringify(signIns))
}
