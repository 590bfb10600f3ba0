import { access, mkdtemp, readdir, rename, rm } from 'node:fs/promises'
import { basename, extname, join } from 'node:path'
import { cacheFolder } from './cache-folder.ts'
import { runProgram } from './run-program.ts'

/** A piece of real music from a Debian package. */
export type MusicTrack = { readonly packageName: string; readonly name: string; readonly path: string }

const ATTEMPTS = 3
const AUDIO = new Set(['.ogg', '.mp3', '.flac', '.wav'])

async function download(packageName: string, folder: string): Promise<void> {
  for (let attempt = 1; ; attempt++) {
    try {
      // The download sandbox of apt has no access to a folder of ours.
      await runProgram('apt-get', ['-o', 'APT::Sandbox::User=root', '-q', 'download', packageName], {
        cwd: folder,
      })
      return
    } catch (error) {
      if (attempt === ATTEMPTS) {
        const reason = error instanceof Error ? error.message : String(error)
        throw new Error(`The Debian package ${packageName} could not be downloaded: ${reason}`, {
          cause: error,
        })
      }
      if (attempt === 1) await runProgram('apt-get', ['-q', 'update']).catch(() => undefined)
    }
  }
}

/** Unpacks beside the final place and moves it there when complete, so that a broken run leaves nothing half done. */
async function unpack(packageName: string, target: string): Promise<void> {
  const work = await mkdtemp(join(await cacheFolder('debian'), 'work-'))
  try {
    await download(packageName, work)
    const archive = (await readdir(work)).find((name) => name.endsWith('.deb'))
    if (!archive)
      throw new Error(`The Debian package ${packageName} could not be downloaded: no archive came`)
    const unpacked = join(work, 'unpacked')
    await runProgram('dpkg', ['-x', join(work, archive), unpacked])
    await rename(unpacked, target).catch(async (error: unknown) => {
      // Another run may have been first; its copy is as good.
      await access(target).catch(() => {
        throw error
      })
    })
  } finally {
    await rm(work, { recursive: true, force: true })
  }
}

/**
 * Fetches a package of music with apt-get (nothing is installed) and lists its pieces by name. Once fetched, it comes
 * from the cache. @throws Error naming the package when it cannot be had.
 */
export async function fetchDebianMusic(packageName: string): Promise<MusicTrack[]> {
  const target = join(await cacheFolder('debian'), packageName)
  const isThere = await access(target).then(
    () => true,
    () => false,
  )
  if (!isThere) await unpack(packageName, target)
  const entries = await readdir(target, { recursive: true, withFileTypes: true })
  // Links would list a piece twice, under another name.
  return entries
    .filter((entry) => entry.isFile() && AUDIO.has(extname(entry.name).toLowerCase()))
    .map(({ name, parentPath }) => ({
      packageName,
      name: basename(name, extname(name)),
      path: join(parentPath, name),
    }))
    .sort((a, b) => (a.path < b.path ? -1 : 1))
}
