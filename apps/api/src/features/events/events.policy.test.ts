import {
  roles,
  serverEventSchema,
  stationIdSchema,
  type MonthStatus,
  type Role,
  type ServerEvent,
} from '@fieldfare/contracts'
import type { Scope } from '@fieldfare/database'
import { describe, expect, it } from 'vitest'
import { mayHear } from './events.policy.ts'

const ownStation = stationIdSchema.parse('11111111-1111-4111-8111-111111111111')
const otherStation = '22222222-2222-4222-8222-222222222222'

const logOf = (stationId: string): ServerEvent =>
  serverEventSchema.parse({
    kind: 'log-progress',
    logId: otherStation,
    stationId,
    status: 'analysing',
    progress: null,
  })
const reference = serverEventSchema.parse({
  kind: 'reference-progress',
  referenceAudioId: otherStation,
  recordingId: otherStation,
  status: 'ready',
  fraction: 1,
})
const distribution = (status: MonthStatus): ServerEvent =>
  serverEventSchema.parse({ kind: 'distribution-progress', month: '2026-10', status, done: 1, total: 1 })

function scopeFor(role: Role): Scope {
  if (role === 'uploader') return { kind: 'stations', stationIds: [ownStation] }
  return role === 'publisher' ? { kind: 'parties', partyIds: [] } : { kind: 'all' }
}

describe('mayHear', () => {
  it.each([
    ['a log of the own station', logOf(ownStation), ['uploader', 'clerk', 'auditor', 'admin']],
    ['a log of another station', logOf(otherStation), ['clerk', 'auditor', 'admin']],
    ['a reference', reference, ['clerk', 'auditor', 'admin']],
    ['a month being calculated', distribution('calculating'), ['clerk', 'auditor']],
    ['a month issued', distribution('issued'), ['clerk', 'publisher', 'auditor']],
  ] satisfies [string, ServerEvent, Role[]][])('lets %s be heard by %s alone', (_what, event, listeners) => {
    expect(roles.filter((role) => mayHear(role, scopeFor(role), event))).toEqual(listeners)
  })
})
