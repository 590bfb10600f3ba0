import { serverEventSchema, signOut, streamEvents, type ServerEvent } from '@fieldfare/contracts'
import { publishProgress } from '@fieldfare/database'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let own: BuiltStation
let other: BuiltStation

const SOME_ID = '33333333-3333-4333-8333-333333333333'

beforeAll(async () => {
  api = await startTestApi()
  own = await buildStation(api.database)
  other = await buildStation(api.database)
})

const logOf = (station: BuiltStation): ServerEvent =>
  serverEventSchema.parse({
    kind: 'log-progress',
    logId: SOME_ID,
    stationId: station.id,
    status: 'analysing',
    progress: { stage: 'matching', doneSeconds: 10, totalSeconds: 60, secondsLeft: 5 },
  })

const issued = serverEventSchema.parse({
  kind: 'distribution-progress',
  month: '2026-10',
  status: 'issued',
  done: 1,
  total: 1,
})

/** An open stream: reads event after event, null at its end. */
async function listen(person: SignedInClient) {
  const leave = new AbortController()
  const response = await person.client.fetch(streamEvents, { signal: leave.signal })
  if (response.body === null) throw new Error('The stream has no body')
  const reader = response.body.pipeThrough(new TextDecoderStream()).getReader()
  let unread = ''

  async function next(): Promise<ServerEvent | null> {
    for (;;) {
      const end = unread.indexOf('\n\n')
      if (end >= 0) {
        const message = unread.slice(0, end)
        unread = unread.slice(end + 2)
        if (message.startsWith('data: ')) return serverEventSchema.parse(JSON.parse(message.slice(6)))
      } else {
        const { done, value } = await reader.read()
        if (done) return null
        unread += value
      }
    }
  }
  return { response, next, leave: () => leave.abort() }
}

async function publish(...events: ServerEvent[]): Promise<void> {
  for (const event of events) await publishProgress(api.dependencies.redis, event)
}

describe('live progress', () => {
  it('reaches an uploader for their stations alone', async () => {
    const uploader = await api.signInAs('uploader', { stationIds: [own.id] })
    const stream = await listen(uploader)
    expect(stream.response.headers.get('content-type')).toBe('text/event-stream; charset=utf-8')
    await publish(logOf(other), issued, logOf(own))
    expect(await stream.next()).toEqual(logOf(own))
    stream.leave()
  })

  it('reaches a publisher when a month is issued, and clerks always', async () => {
    const publisher = await listen(await api.signInAs('publisher'))
    const clerk = await listen(await api.signInAs('clerk'))
    await publish(logOf(own), issued)
    expect(await publisher.next()).toEqual(issued)
    expect([await clerk.next(), await clerk.next()]).toEqual([logOf(own), issued])
    publisher.leave()
    clerk.leave()
  })

  it('ends with the session, at once', async () => {
    const person = await api.signInAs('clerk')
    const stream = await listen(person)
    await publish(logOf(own))
    expect(await stream.next()).toEqual(logOf(own))
    expect((await person.client.call(signOut)).status).toBe(204)
    expect(await stream.next()).toBeNull()
    expect(await person.client.problem(streamEvents)).toMatchObject({ code: 'not-signed-in' })
  })

  it('is not open to strangers', async () => {
    expect(await api.anonymous().problem(streamEvents)).toMatchObject({ status: 401 })
  })
})
