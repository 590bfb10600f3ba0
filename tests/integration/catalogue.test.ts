import {
  createParty,
  createRecording,
  createWork,
  getParty,
  getRecording,
  getWork,
  listParties,
  listRecordings,
  listWorks,
  setRecordingShares,
  setWorkShares,
  updateRecording,
  type PartyId,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import {
  addLog,
  addParty,
  addPlay,
  addRecording,
  addShare,
  addStation,
  addWork,
  anyIsrc,
  auditOf,
  closeMonth,
} from './feature-data.ts'

let api: TestApi
let clerk: TestClient

beforeAll(async () => {
  api = await startTestApi()
  clerk = (await api.signInAs('clerk')).client
})

const recording = (isrc: string, title = 'A tune') => ({
  isrc,
  title,
  artist: 'The Fixtures',
  durationSeconds: 215.5,
  workId: null,
})

const share = (
  partyId: PartyId,
  sharePpm: number,
  validFrom = '2026-01-01',
  validTo: string | null = null,
) => ({
  partyId,
  sharePpm,
  validFrom,
  validTo,
})

describe('codes', () => {
  // IPI vectors: 00014107338 fits its check digits, 00014107339 does not (published CWR examples).
  it('of parties: a wrong check is a warning, a taken IPI a conflict that names who has it', async () => {
    const good = await clerk.json(createParty, { body: { name: 'Checked', ipi: '00014107338' } })
    const doubtful = await clerk.json(createParty, { body: { name: 'Doubtful', ipi: '14107339' } })
    expect([good.ipiCheckOk, doubtful.ipiCheckOk, doubtful.ipi]).toEqual([true, false, '00014107339'])
    expect(await clerk.problem(createParty, { body: { name: 'Second', ipi: '00014107338' } })).toMatchObject({
      status: 409,
      fieldErrors: [{ path: 'ipi', message: 'IPI 000 141 073 38 belongs to Checked already.' }],
    })
    expect((await clerk.json(createParty, { body: { name: 'Without', ipi: '' } })).ipi).toBeNull()
  })

  // T-034.524.680-1 is the well-known example of ISO 15707.
  it('of works: the check digit counts, and a taken ISWC names the work', async () => {
    const body = { title: 'Known', creators: 'Somebody', iswc: 'T-034.524.680-1' }
    expect((await clerk.json(createWork, { body })).iswc).toBe('T0345246801')
    expect(await clerk.problem(createWork, { body: { ...body, title: 'Other' } })).toMatchObject({
      status: 409,
      fieldErrors: [{ path: 'iswc', message: 'ISWC T-034.524.680-1 belongs to “Known” already.' }],
    })
    const wrong = await clerk.problem(createWork, { body: { ...body, iswc: 'T-034.524.680-2' } })
    expect(wrong).toMatchObject({ code: 'validation-failed', fieldErrors: [{ path: 'iswc' }] })
  })

  it('of recordings: malformed ones are refused in words, a taken one names the recording', async () => {
    const created = await clerk.json(createRecording, { body: recording('isrc zz-xxx-20-00001', 'First') })
    expect(created).toMatchObject({
      isrc: 'ZZXXX2000001',
      durationSeconds: 215.5,
      plays: 0,
      referenceStatus: 'none',
    })
    expect(await clerk.problem(createRecording, { body: recording('ZZXXX2000001', 'Second') })).toMatchObject(
      {
        status: 409,
        fieldErrors: [
          { path: 'isrc', message: 'ISRC ZZ-XXX-20-00001 belongs to “First” by The Fixtures already.' },
        ],
      },
    )
    const malformed = await clerk.problem(createRecording, { body: recording('ZZXXX20O0001') })
    expect(malformed.fieldErrors).toMatchObject([{ path: 'isrc' }])
    expect(malformed.fieldErrors[0]?.message).toContain('Did you mean ZZXXX2000001?')
    const other = await clerk.json(createRecording, { body: recording(anyIsrc()) })
    const params = { recordingId: other.id }
    expect(await clerk.problem(updateRecording, { params, body: recording('ZZXXX2000001') })).toMatchObject({
      status: 409,
    })
    const workId = '00000000-0000-4000-8000-000000000099'
    expect(
      await clerk.problem(updateRecording, { params, body: { ...recording(anyIsrc()), workId } }),
    ).toMatchObject({
      fieldErrors: [{ path: 'workId', message: 'This work does not exist.' }],
    })
  })
})

describe('shares', () => {
  it('of more than the whole are refused with the days and the sum', async () => {
    const [workId, first, second] = [
      await addWork(api.database),
      await addParty(api.database),
      await addParty(api.database),
    ]
    const shares = [share(first, 600_000), share(second, 450_000, '2026-05-01', '2026-05-31')]
    expect(
      await clerk.problem(setWorkShares, { params: { workId }, body: { shares, acceptIncomplete: true } }),
    ).toMatchObject({
      code: 'validation-failed',
      fieldErrors: [
        {
          path: 'shares',
          message: 'The shares come to more than 100 %: 105 % from 2026-05-01 to 2026-05-31.',
        },
      ],
    })
    expect((await clerk.json(getWork, { params: { workId } })).shares.items).toEqual([])
  })

  it('of less need to be accepted, and say what will be held back', async () => {
    const [recordingId, partyId] = [await addRecording(api.database), await addParty(api.database)]
    const shares = [share(partyId, 875_000)]
    const problem = await clerk.problem(setRecordingShares, { params: { recordingId }, body: { shares } })
    expect(problem.fieldErrors[0]?.message).toContain('held back will be 12.5 % from 2026-01-01 on')
    const accepted = await clerk.json(setRecordingShares, {
      params: { recordingId },
      body: { shares, acceptIncomplete: true },
    })
    expect(accepted.shares).toMatchObject({
      totalTodayPpm: 875_000,
      items: [{ party: { id: partyId }, sharePpm: 875_000 }],
    })
  })

  it('keep what stays, tell before and after on the audit trail, and may change a closed month', async () => {
    await closeMonth(api.database, '2026-02')
    const workId = await addWork(api.database)
    const [left, right] = [await addParty(api.database, 'Left'), await addParty(api.database, 'Right')]
    const set = async (shares: ReturnType<typeof share>[]) =>
      clerk.json(setWorkShares, { params: { workId }, body: { shares } })
    const before = await set([share(left, 500_000), share(right, 500_000)])
    const after = await set([
      share(left, 500_000),
      share(right, 500_000, '2026-01-01', '2026-06-30'),
      share(right, 500_000, '2026-07-01'),
    ])
    const idOf = (work: typeof before) => work.shares.items.find(({ party }) => party.id === left)?.id
    expect(idOf(after)).toBe(idOf(before))
    expect(after.shares.items).toHaveLength(3)
    const trail = await auditOf(api.database, workId)
    expect(trail).toHaveLength(2)
    expect(trail[1]?.summary).toContain(
      'Before: Left 50 % from 2026-01-01 on; Right 50 % from 2026-01-01 on. After: Left 50 % from 2026-01-01 on; Right 50 % from 2026-01-01 to 2026-06-30; Right 50 % from 2026-07-01 on.',
    )
  })

  it('need parties that exist, each once a day, and a work that exists', async () => {
    const [workId, partyId] = [await addWork(api.database), await addParty(api.database)]
    const doubled = { shares: [share(partyId, 500_000), share(partyId, 500_000, '2026-03-01')] }
    expect(await clerk.problem(setWorkShares, { params: { workId }, body: doubled })).toMatchObject({
      fieldErrors: [{ path: 'shares.1.partyId' }],
    })
    const nobody = '00000000-0000-4000-8000-000000000098'
    const body = { shares: [{ ...share(partyId, 1_000_000), partyId: nobody }] }
    expect(await clerk.problem(setWorkShares, { params: { workId }, body })).toMatchObject({
      status: 422,
      fieldErrors: [{ path: 'shares.0.partyId', message: 'This party does not exist.' }],
    })
    expect(
      await clerk.problem(setWorkShares, {
        params: { workId: nobody },
        body: { shares: [], acceptIncomplete: true },
      }),
    ).toMatchObject({ status: 404 })
  })
})

describe('lists', () => {
  it.each([`'; drop table works; --`, `%`, `_`, `\\`, `" or 1=1`, `T-034'`])(
    'take %s for what it says',
    async (search) => {
      await addRecording(api.database, { title: 'Plain', artist: 'Nobody' })
      expect((await clerk.json(listWorks, { query: { search } })).total).toBe(0)
      expect((await clerk.json(listParties, { query: { search } })).total).toBe(0)
      expect((await clerk.json(listRecordings, { query: { search } })).total).toBe(0)
    },
  )

  it('find by words and by codes however written, sort and page', async () => {
    const isrcs = ['ZZYYY2600001', 'ZZYYY2600002', 'ZZYYY2600003']
    for (const [index, isrc] of isrcs.entries()) {
      await addRecording(api.database, { isrc, title: `Findable ${index}`, artist: 'Seekers' })
    }
    const find = async (query: Record<string, string>) => {
      const page = await clerk.json(listRecordings, { query })
      return { total: page.total, isrcs: page.items.map(({ isrc }) => isrc) }
    }
    expect(await find({ search: 'zz-yyy-26', sort: '-isrc' })).toEqual({
      total: 3,
      isrcs: isrcs.toReversed(),
    })
    expect(await find({ search: 'seekers', sort: 'title', page: '2', pageSize: '2' })).toEqual({
      total: 3,
      isrcs: isrcs.slice(2),
    })
    expect(await find({ search: 'findable', reference: 'ready' })).toEqual({ total: 0, isrcs: [] })
    expect(await clerk.problem(listRecordings, { query: { sort: 'isrc; drop table works' } })).toMatchObject({
      status: 422,
    })
  })

  it('tell plays, airtime and last play, over what counts', async () => {
    const stationId = await addStation(api.database)
    const logStartedAt = '2026-10-05T10:00:00Z'
    const logId = await addLog(api.database, { stationId, startedAt: logStartedAt, seconds: 3600 })
    const recordingId = await addRecording(api.database, { title: 'Counted' })
    const found = { stationId, logId, logStartedAt, recordingId }
    await addPlay(api.database, { ...found, from: 0, to: 100 }, '2026-10-05')
    await addPlay(api.database, { ...found, from: 200, to: 250 }, '2026-10-05')
    const removed = await addPlay(api.database, { ...found, from: 300, to: 400 }, '2026-10-05')
    await api.database('plays').where({ id: removed.id }).update({ status: 'removed' })
    const expected = { plays: 2, playedSeconds: 150, lastPlayedAt: '2026-10-05T10:03:20.000Z' }
    expect(await clerk.json(getRecording, { params: { recordingId } })).toMatchObject(expected)
    const sorted = await clerk.json(listRecordings, { query: { sort: '-plays', pageSize: '1' } })
    expect(sorted.items[0]).toMatchObject({ id: recordingId, ...expected })
  })
})

describe('a publisher', () => {
  it('sees what their parties hold a share in, and what belongs to it; the rest does not exist', async () => {
    const { database } = api
    const [own, other] = [await addParty(database), await addParty(database)]
    const ownWork = await addWork(database)
    const ownRecording = await addRecording(database, { workId: ownWork })
    await addShare(database, own, { workId: ownWork })
    const otherWork = await addWork(database)
    const otherRecording = await addRecording(database, { workId: otherWork })
    await addShare(database, other, { workId: otherWork })
    await addShare(database, other, { recordingId: ownRecording })
    const { client } = await api.signInAs('publisher', { partyIds: [own] })

    expect((await client.json(listWorks)).items.map(({ id }) => id)).toEqual([ownWork])
    expect((await client.json(listRecordings)).items.map(({ id }) => id)).toEqual([ownRecording])
    expect((await client.json(listParties)).items.map(({ id }) => id)).toEqual([own])
    expect((await client.json(getWork, { params: { workId: ownWork } })).canEdit).toBe(false)
    expect(await client.problem(getWork, { params: { workId: otherWork } })).toMatchObject({ status: 404 })
    expect(await client.problem(getRecording, { params: { recordingId: otherRecording } })).toMatchObject({
      status: 404,
    })
    expect(await client.problem(getParty, { params: { partyId: other } })).toMatchObject({ status: 404 })
    expect((await client.json(listWorks, { query: { partyId: other } })).items.map(({ id }) => id)).toEqual([
      ownWork,
    ])
    expect(
      await client.problem(setWorkShares, { params: { workId: ownWork }, body: { shares: [] } }),
    ).toMatchObject({ status: 403 })
  })

  it('with no party sees nothing', async () => {
    await addRecording(api.database)
    const { client } = await api.signInAs('publisher')
    expect((await client.json(listRecordings)).total).toBe(0)
    expect((await client.json(listWorks)).total).toBe(0)
  })
})
