import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'

import { LaunchError } from '../launch-error.ts'

const DEBIAN_DIRECTORY = '/usr/lib/postgresql'
const OLDEST_VERSION = 15

/**
 * The directory of `postgres` and `initdb`: the version an existing data directory was made with, else the newest.
 *
 * @throws {@link LaunchError} when no usable version is installed
 */
export async function findPostgresPrograms(dataDirectory: string): Promise<string> {
  const installed = (await readdir(DEBIAN_DIRECTORY).catch(() => []))
    .map(Number)
    .filter((version) => version >= OLDEST_VERSION)
    .sort((first, second) => second - first)
  const needed = Number(await readFile(join(dataDirectory, 'PG_VERSION'), 'utf8').catch(() => ''))
  const version = needed > 0 ? installed.find((candidate) => candidate === needed) : installed[0]
  if (version === undefined) {
    const wanted =
      needed > 0 ? `PostgreSQL ${needed}, which made ${dataDirectory},` : 'PostgreSQL 15 or newer'
    throw new LaunchError(`${wanted} is not installed. Install the Debian package postgresql.`)
  }
  return join(DEBIAN_DIRECTORY, String(version), 'bin')
}
