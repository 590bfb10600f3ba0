import { mkdtemp, rm } from 'node:fs/promises'
import { createReadStream, createWriteStream } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  paginateListObjectsV2,
  S3Client,
  S3ServiceException,
} from '@aws-sdk/client-s3'
import { Upload } from '@aws-sdk/lib-storage'
import {
  assertByteRange,
  assertStorageKey,
  ObjectNotFound,
  type ByteRange,
  type ObjectSource,
  type ObjectStorage,
  type StorageUsage,
  type StoredObject,
} from './object-storage.ts'

export type S3StorageOptions = {
  endpoint?: string | undefined
  region: string
  bucket: string
  accessKeyId: string
  secretAccessKey: string
}

/** S3 wants at least 5 MiB a part and at most 10,000 parts: 8 MiB reaches 78 GiB and holds 16 MiB in memory. */
const PART_BYTES = 8 * 1024 ** 2

function isMissing(error: unknown): boolean {
  return error instanceof S3ServiceException && error.$metadata.httpStatusCode === 404
}

function createClient(options: S3StorageOptions): S3Client {
  return new S3Client({
    region: options.region,
    // Stores other than the original one rarely know a host name for each bucket.
    ...(options.endpoint === undefined ? {} : { endpoint: options.endpoint, forcePathStyle: true }),
    credentials: { accessKeyId: options.accessKeyId, secretAccessKey: options.secretAccessKey },
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
  })
}

async function measure(client: S3Client, bucket: string): Promise<StorageUsage> {
  const total = { objects: 0, bytes: 0 }
  for await (const page of paginateListObjectsV2({ client }, { Bucket: bucket })) {
    for (const object of page.Contents ?? []) {
      total.objects += 1
      total.bytes += object.Size ?? 0
    }
  }
  return total
}

async function withCopy<Result>(body: Readable, work: (path: string) => Promise<Result>): Promise<Result> {
  const folder = await mkdtemp(join(tmpdir(), 'fieldfare-object-'))
  try {
    const path = join(folder, 'object')
    await pipeline(body, createWriteStream(path))
    return await work(path)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Keeps objects in one bucket of an S3-compatible store. */
export function createS3Storage(options: S3StorageOptions): ObjectStorage {
  const client = createClient(options)
  const addressOf = (key: string) => {
    assertStorageKey(key)
    return { Bucket: options.bucket, Key: key }
  }

  async function statKey(key: string): Promise<StoredObject | null> {
    try {
      const head = await client.send(new HeadObjectCommand(addressOf(key)))
      return { key, sizeBytes: head.ContentLength ?? 0 }
    } catch (error) {
      if (isMissing(error)) return null
      throw error
    }
  }

  async function demand(key: string): Promise<StoredObject> {
    const found = await statKey(key)
    if (found === null) throw new ObjectNotFound(key)
    return found
  }

  async function fetchBody(key: string, range?: ByteRange): Promise<Readable> {
    try {
      const answer = await client.send(
        new GetObjectCommand({
          ...addressOf(key),
          ...(range === undefined ? {} : { Range: `bytes=${range.first}-${range.last}` }),
        }),
      )
      if (answer.Body instanceof Readable) return answer.Body
      throw new Error(`The store sent no readable body for ${key}`)
    } catch (error) {
      if (isMissing(error)) throw new ObjectNotFound(key, error)
      throw error
    }
  }

  async function put(key: string, source: ObjectSource): Promise<StoredObject> {
    const address = addressOf(key)
    const body = 'filePath' in source ? createReadStream(source.filePath) : source.stream
    const upload = new Upload({
      client,
      params: { ...address, Body: body },
      partSize: PART_BYTES,
      queueSize: 2,
    })
    await upload.done()
    return demand(key)
  }

  return {
    kind: 's3',
    put,
    stat: statKey,
    read: (key) => fetchBody(key),
    async readRange(key, range) {
      const { sizeBytes } = await demand(key)
      assertByteRange(range, sizeBytes)
      return fetchBody(key, range)
    },
    withLocalFile: async (key, work) => withCopy(await fetchBody(key), work),
    async remove(key) {
      await client.send(new DeleteObjectCommand(addressOf(key)))
    },
    usage: () => measure(client, options.bucket),
    close: () => client.destroy(),
  }
}
