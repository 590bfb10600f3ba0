import { createDatabase, type Database } from '@fieldfare/database'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { createTestDatabase } from '../support/index.ts'

/** The guards that hold even when the code above them is wrong. */
let database: Database

const namedErrorSchema = z.object({ constraint: z.string() })

const ids = {
  clerk: '00000000-0000-4000-8000-000000000001',
  secondClerk: '00000000-0000-4000-8000-000000000002',
  station: '00000000-0000-4000-8000-000000000011',
  recording: '00000000-0000-4000-8000-000000000021',
  party: '00000000-0000-4000-8000-000000000031',
  log: '00000000-0000-4000-8000-000000000041',
}

beforeAll(async () => {
  database = createDatabase({ databaseUrl: (await createTestDatabase()).url, applicationName: 'schema-test' })
  await database.raw(`
    insert into users (id, email, name, role, status, password_hash) values
      ('${ids.clerk}', 'first@example.org', 'First clerk', 'clerk', 'active', 'x'),
      ('${ids.secondClerk}', 'second@example.org', 'Second clerk', 'clerk', 'active', 'x');
    insert into stations (id, call_name, name, time_zone) values ('${ids.station}', 'TEST', 'Test', 'UTC');
    insert into recordings (id, isrc, title, artist) values ('${ids.recording}', 'AA6Q72000047', 'Tune', 'Band');
    insert into parties (id, name) values ('${ids.party}', 'Party');
    insert into station_logs (id, station_id, file_name, size_bytes, sha256, started_at, airtime, uploaded_by) values
      ('${ids.log}', '${ids.station}', 'a.mp3', 1, sha256('a'), '2026-10-01T00:00Z',
       '[2026-10-01T00:00Z,2026-10-01T01:00Z)', '${ids.clerk}');
    select ensure_detections_partition('2026-10-01T00:00Z');
  `)
})

afterAll(() => database.destroy())

/** The name of the constraint that refused a statement, or the complaint where there is no name. */
function refusal(statement: string): Promise<string> {
  return database.raw(statement).then(
    () => 'accepted',
    (error: unknown) => namedErrorSchema.safeParse(error).data?.constraint ?? String(error),
  )
}

function logStatement(sha: string, airtime: string, status = 'queued'): string {
  const failure = status === 'rejected' ? `'overlap', 'It overlaps.'` : 'null, null'
  return `insert into station_logs
    (station_id, file_name, size_bytes, sha256, started_at, airtime, uploaded_by, status, failure_code, failure_message)
    values ('${ids.station}', 'b.mp3', 1, sha256('${sha}'), '2026-10-01T00:30Z', ${airtime}, '${ids.clerk}',
      '${status}', ${failure})`
}

function detectionStatement(id: number, startMs: number, endMs: number): string {
  return `insert into detections (id, started_at, ended_at, log_id, station_id, recording_id, engine_version,
      log_start_ms, log_end_ms, reference_start_ms, speed_ratio, confidence, expected_false_alarms, decision,
      agreeing_hashes, evidence)
    values ('00000000-0000-4000-8000-0000000001${String(id).padStart(2, '0')}',
      '2026-10-01T00:00Z'::timestamptz + interval '1 millisecond' * ${startMs},
      '2026-10-01T00:00Z'::timestamptz + interval '1 millisecond' * ${endMs},
      '${ids.log}', '${ids.station}', '${ids.recording}', 'test', ${startMs}, ${endMs}, 0, 1, 20, 1e-20, 'accept',
      50, '[]')`
}

describe('station logs', () => {
  it('refuse airtime that is held already, and a file that is held already', async () => {
    expect(await refusal(logStatement('b', `'[2026-10-01T00:59:59Z,2026-10-01T02:00Z)'`))).toBe(
      'station_logs_no_overlap',
    )
    expect(await refusal(logStatement('a', 'null'))).toBe('station_logs_sha256_key')
  })

  it('let a rejected one overlap and be sent again', async () => {
    expect(await refusal(logStatement('c', `'[2026-10-01T00:30Z,2026-10-01T02:00Z)'`, 'rejected'))).toBe(
      'accepted',
    )
    expect(await refusal(logStatement('c', `'[2026-10-01T01:00Z,2026-10-01T02:00Z)'`))).toBe('accepted')
  })
})

describe('detections', () => {
  it('hold one recording once at one place of a log', async () => {
    expect(await refusal(detectionStatement(1, 60_000, 180_000))).toBe('accepted')
    expect(await refusal(detectionStatement(2, 61_000, 181_000))).toBe('detections_2026_10_found_once')
    expect(await refusal(detectionStatement(3, 180_000, 300_000))).toBe('accepted')
  })

  it('are never changed or removed', async () => {
    expect(await refusal(`update detections set confidence = 1`)).toBe('detections_2026_10_append_only')
    expect(await refusal(`delete from detections`)).toBe('detections_2026_10_append_only')
  })

  it('have no place outside a prepared month', async () => {
    expect(await refusal(detectionStatement(4, 40 * 86_400_000, 40 * 86_400_000 + 1000))).toContain(
      'no partition',
    )
  })
})

describe('plays', () => {
  const play = (from: string, to: string, day: string) => `insert into plays
    (station_id, recording_id, started_at, ended_at, local_day)
    values ('${ids.station}', '${ids.recording}', '${from}', '${to}', '${day}')`

  it('of one recording on one station cannot be counted twice at once', async () => {
    expect(await refusal(play('2026-10-02T10:00Z', '2026-10-02T10:03Z', '2026-10-02'))).toBe('accepted')
    expect(await refusal(play('2026-10-02T10:02Z', '2026-10-02T10:05Z', '2026-10-02'))).toBe(
      'plays_counted_once',
    )
  })

  it('stand still in a month that is not open', async () => {
    await database.raw(`insert into distribution_months (month, status) values ('2026-08-01', 'calculated')`)
    expect(await refusal(play('2026-08-02T10:00Z', '2026-08-02T10:03Z', '2026-08-02'))).toBe(
      'plays_month_open',
    )
    expect(await refusal(`update plays set local_day = '2026-08-02'`)).toBe('plays_month_open')
  })
})

describe('licences and shares', () => {
  it('refuse two licences for one day', async () => {
    const licence = (from: string, to: string) => `insert into licences
      (station_id, valid_from, valid_to, monthly_fee_minor, works_part_ppm)
      values ('${ids.station}', '${from}', ${to}, 100, 500000)`
    expect(await refusal(licence('2026-01-01', `'2026-06-30'`))).toBe('accepted')
    expect(await refusal(licence('2026-06-30', 'null'))).toBe('licences_no_overlap')
    expect(await refusal(licence('2026-07-01', 'null'))).toBe('accepted')
  })

  it('refuse a share in nothing or in two things', async () => {
    expect(
      await refusal(
        `insert into shares (party_id, share_ppm, valid_from) values ('${ids.party}', 500000, '2026-01-01')`,
      ),
    ).toBe('shares_subject_check')
  })
})

describe('distributions', () => {
  const calculated = `insert into distributions (id, month, run, rules_version, status, currency, currency_digits,
      digest, fee_minor, net_minor, allocated_minor, held_back_minor, plays, requested_by, calculated_at)
    values ('00000000-0000-4000-8000-000000000051', '2026-07-01', 1, '1', 'calculated', 'EUR', 2, 'd', 100, 90, 80,
      HELD, 3, '${ids.clerk}', now())`

  it('do not close unless what is allocated and what is held back make the net', async () => {
    await database.raw(`insert into distribution_months (month, status) values ('2026-07-01', 'calculated')`)
    expect(await refusal(calculated.replace('HELD', '9'))).toBe('distributions_closed_check')
    expect(await refusal(calculated.replace('HELD', '10'))).toBe('accepted')
  })

  it('need a second person to approve', async () => {
    const approve = (user: string) =>
      `update distributions set status = 'approved', approved_by = '${user}', approved_at = now()`
    expect(await refusal(approve(ids.clerk))).toBe('distributions_four_eyes_check')
    expect(await refusal(approve(ids.secondClerk))).toBe('accepted')
  })

  it('never change once issued', async () => {
    expect(
      await refusal(
        `update distributions set status = 'issued', issued_by = '${ids.clerk}', issued_at = now()`,
      ),
    ).toBe('accepted')
    expect(await refusal(`update distributions set plays = 4`)).toBe('distributions_issued_unchanged')
  })

  it('keep their rules as they were', async () => {
    expect(await refusal(`update distribution_rules set minimum_ms = 0`)).toBe(
      'distribution_rules_append_only',
    )
  })
})
