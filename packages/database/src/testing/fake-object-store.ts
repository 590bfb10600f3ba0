import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import { buffer } from 'node:stream/consumers'

export type FakeObjectStore = {
  endpoint: string
  /** How often a part of a larger object was uploaded. */
  uploadedParts: () => number
  close: () => Promise<void>
}

type Uploads = Map<string, Map<number, Buffer>>

function answerXml(response: ServerResponse, xml: string, status = 200): void {
  response.writeHead(status, { 'content-type': 'application/xml' }).end(`<?xml version="1.0"?>${xml}`)
}

function answerObject(request: IncomingMessage, response: ServerResponse, object: Buffer): void {
  const range = /^bytes=(\d+)-(\d+)$/.exec(request.headers.range ?? '')
  const [first, last] = range === null ? [0, object.length - 1] : [Number(range[1]), Number(range[2])]
  const body = object.subarray(first, last + 1)
  response.writeHead(range === null ? 200 : 206, { 'content-length': body.length, etag: '"x"' })
  response.end(request.method === 'HEAD' ? undefined : body)
}

function answerList(response: ServerResponse, objects: Map<string, Buffer>): void {
  const contents = [...objects].map(
    ([key, object]) => `<Contents><Key>${key}</Key><Size>${object.length}</Size></Contents>`,
  )
  answerXml(
    response,
    `<ListBucketResult><IsTruncated>false</IsTruncated>${contents.join('')}</ListBucketResult>`,
  )
}

/** Object and multipart calls of the S3 protocol as its public API reference describes them, in memory; nothing else. */
async function handle(
  request: IncomingMessage,
  response: ServerResponse,
  store: { objects: Map<string, Buffer>; uploads: Uploads },
): Promise<void> {
  const url = new URL(request.url ?? '/', 'http://store')
  const [, , ...path] = url.pathname.split('/')
  const key = decodeURIComponent(path.join('/'))
  const uploadId = url.searchParams.get('uploadId')
  const body = await buffer(request)
  const object = store.objects.get(key)
  if (request.method === 'POST' && uploadId === null) {
    const id = `upload-${store.uploads.size}`
    store.uploads.set(id, new Map())
    answerXml(
      response,
      `<InitiateMultipartUploadResult><UploadId>${id}</UploadId></InitiateMultipartUploadResult>`,
    )
  } else if (request.method === 'PUT' && uploadId !== null) {
    store.uploads.get(uploadId)?.set(Number(url.searchParams.get('partNumber')), body)
    response.writeHead(200, { etag: '"part"' }).end()
  } else if (request.method === 'POST') {
    const parts = [...(store.uploads.get(uploadId ?? '') ?? [])].toSorted(([left], [right]) => left - right)
    store.objects.set(key, Buffer.concat(parts.map(([, part]) => part)))
    answerXml(response, '<CompleteMultipartUploadResult><ETag>"x"</ETag></CompleteMultipartUploadResult>')
  } else if (request.method === 'PUT') {
    store.objects.set(key, body)
    response.writeHead(200, { etag: '"x"' }).end()
  } else if (request.method === 'DELETE') {
    store.objects.delete(key)
    response.writeHead(204).end()
  } else if (key === '') answerList(response, store.objects)
  else if (object !== undefined) answerObject(request, response, object)
  else answerXml(response, '<Error><Code>NoSuchKey</Code><Message>No such key</Message></Error>', 404)
}

function listen(server: Server): Promise<number> {
  return new Promise((resolve, reject) => {
    server.listen(0, '127.0.0.1', () => {
      const address = server.address()
      if (address === null || typeof address === 'string') reject(new Error('no port'))
      else resolve(address.port)
    })
  })
}

export async function startFakeObjectStore(): Promise<FakeObjectStore> {
  const store = { objects: new Map<string, Buffer>(), uploads: new Map<string, Map<number, Buffer>>() }
  const server = createServer((request, response) => {
    handle(request, response, store).catch(() => response.destroy())
  })
  const port = await listen(server)
  return {
    endpoint: `http://127.0.0.1:${port}`,
    uploadedParts: () => [...store.uploads.values()].reduce((sum, parts) => sum + parts.size, 0),
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve())
        server.closeAllConnections()
      }),
  }
}
