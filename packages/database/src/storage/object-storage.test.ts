import { createHash, randomBytes } from 'node:crypto'
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Readable } from 'node:stream'
import { buffer, text } from 'node:stream/consumers'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startFakeObjectStore, type FakeObjectStore } from '../testing/fake-object-store.ts'
import { createStorage } from './create-storage.ts'
import { ObjectNotFound, type ObjectStorage } from './object-storage.ts'

let directory: string
let store: FakeObjectStore
const opened: Partial<Record<'disk' | 's3', ObjectStorage>> = {}

beforeAll(async () => {
  directory = await mkdtemp(join(tmpdir(), 'fieldfare-storage-'))
  store = await startFakeObjectStore()
  opened.disk = createStorage({ kind: 'disk', directory: join(directory, 'objects') })
  opened.s3 = createStorage({
    kind: 's3',
    endpoint: store.endpoint,
    region: 'local',
    bucket: 'fieldfare',
    accessKeyId: 'key',
    secretAccessKey: 'secret',
  })
})

afterAll(async () => {
  opened.s3?.close()
  await store.close()
  await rm(directory, { recursive: true, force: true })
})

const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')

function storageOf(kind: 'disk' | 's3'): ObjectStorage {
  const storage = opened[kind]
  if (storage === undefined) throw new Error('not opened')
  return storage
}

describe.each(['disk', 's3'] as const)('storage on %s', (kind) => {
  it('is empty at first', async () => {
    expect(await storageOf(kind).usage()).toEqual({ objects: 0, bytes: 0 })
    expect(await storageOf(kind).stat('logs/none')).toBeNull()
  })

  it('gives back what a stream held, whole and in ranges', async () => {
    const storage = storageOf(kind)
    expect(await storage.put('logs/one', { stream: Readable.from(['broad', 'cast']) })).toEqual({
      key: 'logs/one',
      sizeBytes: 9,
    })
    expect(await text(await storage.read('logs/one'))).toBe('broadcast')
    expect(await text(await storage.readRange('logs/one', { first: 5, last: 8 }))).toBe('cast')
    await expect(storage.readRange('logs/one', { first: 5, last: 9 })).rejects.toThrow(RangeError)
  })

  it('stores files larger than one part, and leaves the file where it is', async () => {
    const bytes = randomBytes(9 * 1024 ** 2)
    const filePath = join(directory, 'large')
    await writeFile(filePath, bytes)
    const storage = storageOf(kind)
    await storage.put('logs/large', { filePath })
    expect(sha256(await buffer(await storage.read('logs/large')))).toBe(sha256(bytes))
    expect((await readFile(filePath)).length).toBe(bytes.length)
  })

  it('lends a local file to those who need a path', async () => {
    const storage = storageOf(kind)
    await storage.put('clips/a.mp3', { stream: Readable.from(['sound']) })
    expect(await storage.withLocalFile('clips/a.mp3', (path) => readFile(path, 'utf8'))).toBe('sound')
  })

  it('replaces and removes, and does not mind removing twice', async () => {
    const storage = storageOf(kind)
    await storage.put('statements/x.pdf', { stream: Readable.from(['old']) })
    await storage.put('statements/x.pdf', { stream: Readable.from(['newer']) })
    expect(await text(await storage.read('statements/x.pdf'))).toBe('newer')
    await storage.remove('statements/x.pdf')
    await storage.remove('statements/x.pdf')
    expect(await storage.stat('statements/x.pdf')).toBeNull()
  })

  it('names what is not there', async () => {
    const storage = storageOf(kind)
    await expect(storage.read('logs/none')).rejects.toThrow(ObjectNotFound)
    await expect(storage.readRange('logs/none', { first: 0, last: 1 })).rejects.toThrow(ObjectNotFound)
    await expect(storage.withLocalFile('logs/none', (path) => Promise.resolve(path))).rejects.toThrow(
      ObjectNotFound,
    )
  })

  it('keeps nothing of a stream that breaks off', async () => {
    const storage = storageOf(kind)
    const before = await storage.usage()
    const broken = Readable.from(
      (function* () {
        yield 'begin'
        throw new Error('the line broke')
      })(),
    )
    await expect(storage.put('logs/broken', { stream: broken })).rejects.toThrow('the line broke')
    expect(await storage.usage()).toEqual(before)
  })

  it.each(['../outside', '/absolute', 'logs/../../outside', '.incoming/x', '', 'a//b', 'a/', 'a\\b', 'a\0b'])(
    'refuses the key %j',
    async (key) => {
      await expect(storageOf(kind).put(key, { stream: Readable.from(['x']) })).rejects.toThrow(RangeError)
    },
  )
})
