import { randomUUID } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { copyFile, mkdir, open, opendir, rename, rm, stat } from 'node:fs/promises'
import { dirname, join, resolve } from 'node:path'
import { pipeline } from 'node:stream/promises'
import {
  assertByteRange,
  assertStorageKey,
  ObjectNotFound,
  type ObjectSource,
  type ObjectStorage,
  type StorageUsage,
  type StoredObject,
} from './object-storage.ts'

/** Files on their way in. The name starts with a dot, which no key may, so it can never be mistaken for an object. */
const INCOMING = '.incoming'

function isNotFound(error: unknown): boolean {
  return error instanceof Error && 'code' in error && (error.code === 'ENOENT' || error.code === 'ENOTDIR')
}

async function syncFile(path: string): Promise<void> {
  const handle = await open(path, 'r')
  try {
    await handle.sync()
  } finally {
    await handle.close()
  }
}

async function measure(root: string): Promise<StorageUsage> {
  const usage = { objects: 0, bytes: 0 }
  const folders = [root]
  for (let folder = folders.pop(); folder !== undefined; folder = folders.pop()) {
    const entries = await opendir(folder).catch((error: unknown) => {
      if (isNotFound(error)) return null
      throw error
    })
    if (entries === null) continue
    for await (const entry of entries) {
      if (entry.name === INCOMING) continue
      const path = join(folder, entry.name)
      if (entry.isDirectory()) folders.push(path)
      else {
        const details = await stat(path).catch(() => null)
        if (details === null) continue
        usage.objects += 1
        usage.bytes += details.size
      }
    }
  }
  return usage
}

/** Keeps objects as files below one folder. Files are written aside, synced and renamed into place. */
export function createDiskStorage(directory: string): ObjectStorage {
  const root = resolve(directory)

  function pathOf(key: string): string {
    assertStorageKey(key)
    return join(root, key)
  }

  async function statKey(key: string): Promise<StoredObject | null> {
    try {
      const details = await stat(pathOf(key))
      return details.isFile() ? { key, sizeBytes: details.size } : null
    } catch (error) {
      if (isNotFound(error)) return null
      throw error
    }
  }

  async function demand(key: string): Promise<StoredObject> {
    const found = await statKey(key)
    if (found === null) throw new ObjectNotFound(key)
    return found
  }

  async function put(key: string, source: ObjectSource): Promise<StoredObject> {
    const target = pathOf(key)
    const incoming = join(root, INCOMING, randomUUID())
    await mkdir(dirname(incoming), { recursive: true })
    try {
      if ('filePath' in source) await copyFile(source.filePath, incoming)
      else await pipeline(source.stream, createWriteStream(incoming, { flags: 'wx' }))
      await syncFile(incoming)
      await mkdir(dirname(target), { recursive: true })
      await rename(incoming, target)
    } catch (error) {
      await rm(incoming, { force: true })
      throw error
    }
    return demand(key)
  }

  return {
    kind: 'disk',
    put,
    stat: statKey,
    async read(key) {
      await demand(key)
      return createReadStream(pathOf(key))
    },
    async readRange(key, range) {
      const { sizeBytes } = await demand(key)
      assertByteRange(range, sizeBytes)
      return createReadStream(pathOf(key), { start: range.first, end: range.last })
    },
    async withLocalFile(key, work) {
      await demand(key)
      return work(pathOf(key))
    },
    async remove(key) {
      await rm(pathOf(key), { force: true })
    },
    usage: () => measure(root),
    close: () => undefined,
  }
}
