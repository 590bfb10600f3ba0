import { describe, expect, it } from 'vitest'
import { readServerEvent, reconnectPauseMs } from './server-events.ts'

describe('readServerEvent', () => {
  it('reads an event of the contract', () => {
    const event = {
      kind: 'distribution-progress',
      month: '2026-11',
      status: 'calculating',
      done: 3,
      total: 9,
    }

    expect(readServerEvent(JSON.stringify({ ...event, status: 'open' }))).toMatchObject({ done: 3, total: 9 })
  })

  it('leaves alone what it does not know', () => {
    expect(readServerEvent('{"kind":"of-a-newer-server"}')).toBeNull()
    expect(readServerEvent('not json')).toBeNull()
  })
})

describe('reconnectPauseMs', () => {
  it('doubles up to half a minute', () => {
    expect([1, 2, 3, 6, 20].map(reconnectPauseMs)).toEqual([1_000, 2_000, 4_000, 30_000, 30_000])
  })
})
