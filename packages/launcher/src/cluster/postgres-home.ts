import { createHash } from 'node:crypto'
import { chmod, chown, mkdir, readFile, stat, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

import { LaunchError } from '../launch-error.ts'
import { canUseDirectory, describeUser, findSystemUser, isRoot, type SystemUser } from '../system-user.ts'

/** Where PostgreSQL keeps its files, and as whom it runs there. */
export type PostgresHome = {
  readonly directory: string
  /** Set only when root starts it: PostgreSQL refuses to run as root. */
  readonly user: SystemUser | undefined
}

const FALLBACK_PARENTS = ['/var/lib', tmpdir(), '/tmp']

/**
 * Normally `<cluster directory>/postgres`. When root works in a directory that the user postgres cannot enter (a
 * checkout below /root), the files go elsewhere, and `postgres-location` remembers where.
 */
export async function preparePostgresHome(clusterDirectory: string): Promise<PostgresHome> {
  const usual = join(clusterDirectory, 'postgres')
  if (!isRoot()) {
    await mkdir(usual, { recursive: true, mode: 0o700 })
    await refuseForeignOwner(usual)
    return { directory: usual, user: undefined }
  }
  const pointer = join(clusterDirectory, 'postgres-location')
  const remembered = (await readFile(pointer, 'utf8').catch(() => '')).trim()
  for (const directory of remembered === '' ? candidates(usual) : [remembered]) {
    const user = await giveToDatabaseUser(directory)
    if (user === undefined) continue
    if (directory !== usual) await writeFile(pointer, `${directory}\n`)
    return { directory, user }
  }
  throw new LaunchError('No directory was found that the user "postgres" can enter; set --data-dir to one.')
}

function candidates(usual: string): readonly string[] {
  const name = `fieldfare-${createHash('sha256').update(usual).digest('hex').slice(0, 12)}`
  return [usual, ...FALLBACK_PARENTS.map((parent) => join(parent, name))]
}

/** Returns the user to run as, or undefined when that user cannot reach the directory. */
async function giveToDatabaseUser(directory: string): Promise<SystemUser | undefined> {
  await mkdir(directory, { recursive: true, mode: 0o700 })
  const entry = await stat(directory)
  // A cluster that an ordinary user made stays theirs.
  const user = entry.uid === 0 ? await findSystemUser('postgres') : describeUser(entry.uid, entry.gid)
  await chmod(directory, 0o700)
  await chown(directory, user.userId, user.groupId)
  return (await canUseDirectory(user, directory)) ? user : undefined
}

async function refuseForeignOwner(directory: string): Promise<void> {
  const entry = await stat(directory)
  if (entry.uid !== process.getuid?.()) {
    throw new LaunchError(`${directory} belongs to another user. Choose another directory with --data-dir.`)
  }
}
