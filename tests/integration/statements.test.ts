import { Readable } from 'node:stream'
import {
  getStatement,
  getStatementCsv,
  getStatementPdf,
  listStatementLinePlays,
  listStatementLines,
  listStatements,
  type StatementId,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildParty, buildRecording, type BuiltParty } from '../factories/build-catalogue.ts'
import {
  buildDistribution,
  issueDistribution,
  type BuiltDistribution,
} from '../factories/build-distribution.ts'
import { buildPlay, type BuiltPlay } from '../factories/build-play.ts'
import { buildStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let clerk: SignedInClient
let publisher: SignedInClient
let own: BuiltParty
let other: BuiltParty
let issued: BuiltDistribution
let draft: BuiltDistribution
let withdrawn: BuiltDistribution
let play: BuiltPlay

function statementOf(run: BuiltDistribution, index: number): { id: StatementId; number: string } {
  const statement = run.statements[index]
  if (statement === undefined) throw new Error('The run has no such statement')
  return statement
}

const at = (run: BuiltDistribution, index = 0) => ({
  params: { statementId: statementOf(run, index).id },
})

beforeAll(async () => {
  api = await startTestApi()
  const { database } = api
  const station = await buildStation(database, { callName: 'MAIN' })
  own = await buildParty(database, 'Own party')
  other = await buildParty(database, 'Another party')
  const recording = await buildRecording(database, {
    title: 'Tune',
    shares: [{ party: own, sharePpm: 400_000 }],
  })
  const calculating = await api.createUser('clerk')
  const build = async (month: string) => {
    const played = await buildPlay(database, { station, recording, startedAt: `${month}-03T10:00:00Z` })
    const settings = { month, requestedBy: calculating.userId, station, recording, play: played }
    return { played, run: await buildDistribution(database, { ...settings, parties: [own, other] }) }
  }
  clerk = await api.signInAs('clerk')
  publisher = await api.signInAs('publisher', { partyIds: [own.id] })
  const september = await build('2026-09')
  issued = september.run
  play = september.played
  await issueDistribution(database, issued, clerk.user.userId)
  draft = (await build('2026-10')).run
  withdrawn = (await build('2026-08')).run
  await database('distributions').where({ id: withdrawn.id }).update({ status: 'withdrawn' })
})

const numbersFor = async (person: SignedInClient, query: Record<string, string> = {}) =>
  (await person.client.json(listStatements, { query })).items.map(({ number }) => number)

describe('the list of statements', () => {
  it('holds drafts for the desk, but nothing of a withdrawn run', async () => {
    const numbers = [...draft.statements, ...issued.statements].map(({ number }) => number)
    expect((await numbersFor(clerk)).sort()).toEqual(numbers.sort())
    const auditor = await api.signInAs('auditor')
    expect(await numbersFor(auditor, { month: '2026-10', sort: 'party' })).toEqual([
      statementOf(draft, 1).number,
      statementOf(draft, 0).number,
    ])
    expect(await numbersFor(clerk, { search: 'another', month: '2026-09' })).toEqual([
      statementOf(issued, 1).number,
    ])
  })

  it('holds for a publisher what was issued to their parties', async () => {
    expect(await numbersFor(publisher)).toEqual([statementOf(issued, 0).number])
    expect(await numbersFor(publisher, { partyId: other.id })).toEqual([])
  })
})

describe('a statement', () => {
  it('shows its sums, deductions, holdbacks and coverage', async () => {
    const view = await publisher.client.json(getStatement, at(issued))
    expect(view).toMatchObject({
      number: statementOf(issued, 0).number,
      month: '2026-09',
      periodFrom: '2026-09-01',
      periodTo: '2026-09-30',
      status: 'issued',
      currency: 'EUR',
      currencyDigits: 2,
      grossMinor: '350',
      netMinor: '300',
      deductions: [{ code: 'administration', amountMinor: '50' }],
      rights: [
        { right: 'works', netMinor: '0' },
        { right: 'recordings', netMinor: '300' },
      ],
      stations: [
        { station: { callName: 'MAIN' }, netMinor: '300', heldSeconds: 3600, expectedSeconds: 7200 },
      ],
      holdbacks: [{ subject: 'Tune', reasonCode: 'shares-incomplete', amountMinor: '100' }],
      lines: 1,
      hasPdf: false,
    })
  })

  it.each([
    ['of another party', () => at(issued, 1)],
    ['that is a draft', () => at(draft)],
    ['of a withdrawn run', () => at(withdrawn)],
  ])('%s is not open to a publisher, nor is any part of it', async (_which, of) => {
    const { statementId } = of().params
    for (const endpoint of [getStatement, listStatementLines, getStatementPdf, getStatementCsv]) {
      expect(await publisher.client.problem(endpoint, { params: { statementId } })).toMatchObject({
        status: 404,
        detail: 'This statement does not exist, or is not open to you.',
      })
    }
    const plays = { params: { statementId, lineNumber: '1' } }
    expect(await publisher.client.problem(listStatementLinePlays, plays)).toMatchObject({ status: 404 })
  })

  it('that was withdrawn is open to nobody, a draft to the desk', async () => {
    expect(await clerk.client.problem(getStatement, at(withdrawn))).toMatchObject({ status: 404 })
    expect(await clerk.client.json(getStatement, at(draft))).toMatchObject({ status: 'draft' })
  })

  it('leads from its lines to their plays', async () => {
    const lines = await publisher.client.json(listStatementLines, at(issued))
    expect(lines.items).toMatchObject([
      { lineNumber: 1, title: 'Tune', plays: 1, creditedSeconds: 180, sharePpm: 400_000, amountMinor: '300' },
    ])
    const works = await publisher.client.json(listStatementLines, {
      ...at(issued),
      query: { right: 'works' },
    })
    expect(works.total).toBe(0)
    const { statementId } = at(issued).params
    const plays = await publisher.client.json(listStatementLinePlays, {
      params: { statementId, lineNumber: '1' },
    })
    expect(plays.items).toMatchObject([{ id: play.id, canDispute: true }])
    const missing = { params: { statementId, lineNumber: '2' } }
    expect(await publisher.client.problem(listStatementLinePlays, missing)).toMatchObject({
      detail: 'This line does not exist, or is not open to you.',
    })
  })

  it('has files under its number once they are made', async () => {
    const { id, number } = statementOf(issued, 0)
    expect(await publisher.client.problem(getStatementPdf, at(issued))).toMatchObject({
      status: 404,
      detail: 'This statement has no file yet. It is made when the month is issued.',
    })
    for (const kind of ['pdf', 'csv'] as const) {
      await api.dependencies.storage.put(`statements/${id}.${kind}`, {
        stream: Readable.from([Buffer.from(`the ${kind}`)]),
      })
      await api.database('statement_files').insert({
        statement_id: id,
        kind,
        storage_key: `statements/${id}.${kind}`,
        size_bytes: 7,
        sha256: Buffer.alloc(32),
      })
    }
    const pdf = await publisher.client.call(getStatementPdf, at(issued))
    expect(pdf).toMatchObject({ status: 200, text: 'the pdf' })
    expect(pdf.headers.get('content-type')).toBe('application/pdf')
    expect(pdf.headers.get('content-disposition')).toContain(`filename="statement-${number}.pdf"`)
    const csv = await publisher.client.call(getStatementCsv, at(issued))
    expect(csv.text).toBe('the csv')
    expect(csv.headers.get('content-disposition')).toContain(`filename="statement-${number}.csv"`)
    expect(await publisher.client.json(getStatement, at(issued))).toMatchObject({ hasPdf: true })
  })
})
