import { mkdir, readdir, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import {
  endpoints,
  getDocumentationPage,
  getOpenApi,
  getReadiness,
  getSession,
  problemSchema,
  signIn,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { temporaryDirectory } from '../support/index.ts'
import { endpointById, startTestApi, type TestApi } from '../support/test-api.ts'

let api: TestApi

beforeAll(async () => {
  const webDirectory = await temporaryDirectory('web')
  await mkdir(join(webDirectory, 'assets'))
  await writeFile(join(webDirectory, 'index.html'), '<!doctype html><title>Fieldfare</title>')
  await writeFile(join(webDirectory, 'assets', 'index-a1b2c3.js'), 'export {}')
  api = await startTestApi({ FIELDFARE_WEB_DIR: webDirectory, FIELDFARE_UPLOAD_LIMIT_BYTES: '1048576' })
})

async function problemFrom(response: Response) {
  expect(response.headers.get('content-type')).toMatch(/^application\/problem\+json/)
  return problemSchema.parse(await response.json())
}

describe('every answer', () => {
  it('forbids foreign content and carries a correlation id', async () => {
    const response = await api.anonymous().fetch(getReadiness)
    expect(response.status).toBe(200)
    const policy = response.headers.get('content-security-policy') ?? ''
    expect(policy).toContain("default-src 'self'")
    expect(policy).toContain("frame-ancestors 'none'")
    expect(policy).not.toMatch(/unsafe|\*/)
    expect(response.headers.get('x-content-type-options')).toBe('nosniff')
    expect(response.headers.get('x-powered-by')).toBeNull()
    expect(response.headers.get('x-correlation-id')).toMatch(/^[0-9a-f-]{36}$/)
  })

  it('keeps a proxy’s correlation id, but not one that could forge a log line', async () => {
    const ask = async (id: string) => {
      const response = await api.anonymous().fetch(getSession, { headers: { 'x-correlation-id': id } })
      return (await problemFrom(response)).correlationId
    }
    expect(await ask('proxy-12345678')).toBe('proxy-12345678')
    expect(await ask('a b c d e f g h')).not.toContain(' ')
  })
})

describe('requests that cannot be read', () => {
  const post = (body: string, contentType = 'application/json') =>
    fetch(`${api.url}${signIn.path}`, { method: 'POST', headers: { 'content-type': contentType }, body })

  it('answer 400 for broken JSON and broken addresses', async () => {
    expect(await problemFrom(await post('{"email": '))).toMatchObject({
      status: 400,
      code: 'malformed-request',
    })
    expect(await problemFrom(await fetch(`${api.url}/api/stations/%E0%A4%A`))).toMatchObject({ status: 400 })
  })

  it('answer 413 for too much text', async () => {
    const problem = await problemFrom(await post(JSON.stringify({ email: 'x'.repeat(1_100_000) })))
    expect(problem).toMatchObject({ status: 413, code: 'file-too-large' })
  })

  it('answer 422 with every complaint at once', async () => {
    const problem = await problemFrom(await post('{"email":"nobody","password":""}'))
    expect(problem.fieldErrors.map((error) => error.path)).toEqual(['email', 'password'])
    const nothing = await problemFrom(await post('email=nobody', 'application/x-www-form-urlencoded'))
    expect(nothing.status).toBe(422)
  })
})

describe('an upload', () => {
  const upload = endpointById('uploadReferenceAudio')

  async function leftovers(): Promise<string[]> {
    return readdir(api.configuration.uploadDirectory).catch(() => [])
  }

  it('above the limit answers 413 in words and leaves nothing on disk', async () => {
    const { client } = await api.signInAs('clerk')
    const form = new FormData()
    form.set('file', new Blob(['x'.repeat(1_100_000)]), 'large.mp3')
    const problem = await client.problem(upload, { form })
    expect(problem).toMatchObject({ status: 413, code: 'file-too-large' })
    expect(problem.detail).toContain('1 MB')
    expect(await leftovers()).toEqual([])
  })

  it('without its file is refused at the field', async () => {
    const { client } = await api.signInAs('clerk')
    const problem = await client.problem(upload, { form: new FormData() })
    expect(problem.status).toBe(422)
    expect(problem.fieldErrors.map((error) => error.path)).toContain('file')
  })

  it('in an unexpected field, or broken off, answers 400', async () => {
    const { client } = await api.signInAs('clerk')
    const form = new FormData()
    form.set('other', new Blob(['x']), 'x.mp3')
    expect((await client.problem(upload, { form })).code).toBe('malformed-request')
    const headers = { 'content-type': 'multipart/form-data; boundary=x' }
    const response = await client.fetch(upload, { body: { not: 'a form' }, headers })
    expect((await problemFrom(response)).status).toBe(400)
    expect(await leftovers()).toEqual([])
  })

  it('by a stranger is refused before it is read', async () => {
    const form = new FormData()
    form.set('file', new Blob(['x'.repeat(1_100_000)]), 'large.mp3')
    expect((await api.anonymous().problem(upload, { form })).status).toBe(401)
    expect(await leftovers()).toEqual([])
  })
})

describe('an error nobody foresaw', () => {
  it('answers 500 and says nothing of the inside', async () => {
    const broken = await startTestApi()
    const { client } = await broken.signInAs('admin')
    await broken.database.raw('alter table mail_messages rename to mail_messages_gone')
    const answer = await client.call(endpointById('listInbox'))
    expect(answer.status).toBe(500)
    expect(answer.text).not.toMatch(/mail_messages|does not exist|select|\.ts/)
  })
})

describe('the web application', () => {
  it('is kept for ever where its name has a hash, and asked for each time where not', async () => {
    const asset = await fetch(`${api.url}/assets/index-a1b2c3.js`)
    expect(asset.headers.get('cache-control')).toContain('immutable')
    const page = await fetch(`${api.url}/stations/some-station`, { headers: { accept: 'text/html' } })
    expect(page.status).toBe(200)
    expect(page.headers.get('cache-control')).toBe('no-cache')
    expect(await page.text()).toContain('<title>Fieldfare</title>')
  })

  it('does not answer for a missing file or for the interface', async () => {
    expect((await fetch(`${api.url}/assets/gone.js`)).status).toBe(404)
    expect((await fetch(`${api.url}/api/gone`, { headers: { accept: 'text/html' } })).status).toBe(404)
    expect(
      (await fetch(`${api.url}/..%2f..%2fetc/passwd`, { headers: { accept: 'text/html' } })).status,
    ).not.toBe(500)
  })
})

describe('the documentation', () => {
  it('is an OpenAPI document and a page that shows every endpoint without scripts', async () => {
    const client = api.anonymous()
    const document = await client.json(getOpenApi)
    expect(document['openapi']).toBe('3.1.0')
    const page = await client.fetch(getDocumentationPage)
    expect(page.headers.get('content-type')).toBe('text/html; charset=utf-8')
    const html = await page.text()
    for (const path of endpoints.map((endpoint) => endpoint.path.replaceAll(/:([A-Za-z]+)/g, '{$1}')))
      expect(html).toContain(`<code>${path}</code>`)
    expect(html).not.toMatch(/<script|<style| style=| on\w+=/)
    const stylesheet = /href="([^"]+\.css)"/.exec(html)?.[1] ?? ''
    const styles = await fetch(`${api.url}${stylesheet}`)
    expect(styles.headers.get('content-type')).toMatch(/^text\/css/)
  })
})
