import {
  catalogueCsvColumns,
  exportCatalogueImportRows,
  getCatalogueImport,
  importCatalogue,
  listCatalogueImportRows,
  listCatalogueImports,
  listParties,
  listRecordings,
  listWorks,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import { addParty, addRecording, addShare, auditOf, formWith } from './feature-data.ts'

let api: TestApi
let clerk: TestClient

beforeAll(async () => {
  api = await startTestApi()
  clerk = (await api.signInAs('clerk')).client
})

type Row = Partial<Record<(typeof catalogueCsvColumns)[number], string>>

function csv(rows: readonly Row[], delimiter = ','): string {
  const quote = (cell: string) => (/[",;\n\r]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell)
  const lines = rows.map((row) => catalogueCsvColumns.map((name) => quote(row[name] ?? '')).join(delimiter))
  return [catalogueCsvColumns.join(delimiter), ...lines, ''].join('\n')
}

function importing(content: string | Blob, name = 'catalogue.csv') {
  return clerk.json(importCatalogue, { form: formWith(content, name) })
}

async function reportOf(importId: string) {
  const { items } = await clerk.json(listCatalogueImportRows, {
    params: { importId },
    query: { pageSize: '200' },
  })
  return items
}

async function importRows(rows: readonly Row[]) {
  const found = await importing(csv(rows))
  return { found, report: await reportOf(found.id) }
}

async function recordingBy(isrc: string) {
  const { items } = await clerk.json(listRecordings, { query: { search: isrc } })
  return items.find((recording) => recording.isrc === isrc)
}

const share = (party: string, percent: string, right = 'recordings'): Row => ({
  right,
  party_name: party,
  share_percent: percent,
  valid_from: '2026-01-01',
})

describe('a catalogue file', () => {
  // T-101.914.232-4 is a published test value of ISO 15707; 00014107338 of the IPI check.
  const rows: Row[] = [
    {
      isrc: 'ZZ-IMP-26-00001',
      title: 'One',
      artist: 'Band',
      duration: '3:45',
      work_iswc: 'T-101.914.232-4',
      work_title: 'The work',
      ...share('Label A', '62.5'),
    },
    { isrc: 'ZZIMP2600001', ...share('Label B', '37,5') },
    { isrc: 'ZZIMP2600001', party_ipi: '14107338', ...share('Writer', '100', 'works') },
    { isrc: 'ZZIMP2600002', title: 'Two', artist: 'Band', work_iswc: 'T1019142324' },
  ]

  it('makes recordings, works, parties and shares, exact to the part per million', async () => {
    const { found, report } = await importRows(rows)
    expect(found).toMatchObject({
      rows: 4,
      created: 4,
      updated: 0,
      unchanged: 0,
      refused: 0,
      fileName: 'catalogue.csv',
    })
    expect(report.map(({ line, isrc }) => [line, isrc])).toEqual([
      [2, 'ZZIMP2600001'],
      [3, 'ZZIMP2600001'],
      [4, 'ZZIMP2600001'],
      [5, 'ZZIMP2600002'],
    ])
    const one = await recordingBy('ZZIMP2600001')
    expect(one).toMatchObject({
      title: 'One',
      artist: 'Band',
      durationSeconds: 225,
      work: { title: 'The work', iswc: 'T1019142324' },
    })
    expect(one?.shares.items.map(({ party, sharePpm }) => [party.name, sharePpm])).toEqual([
      ['Label A', 625_000],
      ['Label B', 375_000],
    ])
    expect((await recordingBy('ZZIMP2600002'))?.work?.id).toBe(one?.work?.id)
    const { items: works } = await clerk.json(listWorks, { query: { search: 'T1019142324' } })
    expect(works[0]?.shares.items).toMatchObject([{ party: { name: 'Writer' }, sharePpm: 1_000_000 }])
    const { items: parties } = await clerk.json(listParties, { query: { search: '00014107338' } })
    expect(parties).toMatchObject([{ name: 'Writer', ipiCheckOk: true, works: 1 }])
    expect(await auditOf(api.database, found.id)).toMatchObject([{ action: 'import-catalogue' }])
  })

  it('changes nothing when it comes again, in whatever form', async () => {
    const again = await importing(csv(rows))
    expect(again).toMatchObject({ rows: 4, unchanged: 4, created: 0, updated: 0, refused: 0 })
    const withMark = await importing(`\uFEFF${csv(rows, ';').replaceAll('\n', '\r\n')}`)
    expect(withMark).toMatchObject({ rows: 4, unchanged: 4 })
    const { items } = await clerk.json(listCatalogueImports)
    expect(items[0]?.id).toBe(withMark.id)
    expect(await clerk.json(getCatalogueImport, { params: { importId: again.id } })).toEqual(again)
  })

  it('updates what differs', async () => {
    const { found } = await importRows([
      { isrc: 'ZZIMP2600001', title: 'One (edit)' },
      { isrc: 'ZZIMP2600001', ...share('Label A', '60') },
    ])
    expect(found).toMatchObject({ updated: 2, warnings: 1 })
    const one = await recordingBy('ZZIMP2600001')
    expect(one?.title).toBe('One (edit)')
    expect(one?.shares.totalTodayPpm).toBe(975_000)
  })
})

describe('a row', () => {
  it('is refused with everything that is wrong in it, and the others count', async () => {
    const { found, report } = await importRows([
      {
        isrc: 'ZZIMP26O0010',
        title: 'x',
        artist: 'y',
        work_iswc: 'T-101.914.232-5',
        duration: '3m',
        right: 'radio',
        party_name: 'P',
        share_percent: '100.5',
        valid_from: '01.01.2026',
      },
      { isrc: 'ZZIMP2600011', title: 'Good', artist: 'Band' },
      { isrc: 'ZZIMP2600012', artist: 'No title' },
      { isrc: 'ZZIMP2600011', title: 'Other name' },
      { isrc: 'ZZIMP2600011', ...share('P', '100', 'works') },
      { isrc: 'ZZIMP2600011', ...share('', '100') },
      { isrc: 'ZZIMP2600011', ...share('P', '50'), valid_to: '2025-12-31' },
    ])
    expect(report.map(({ outcome }) => outcome)).toEqual([
      'refused',
      'created',
      ...Array<string>(5).fill('refused'),
    ])
    const first = report[0]?.messages.join(' ') ?? ''
    for (const words of [
      'Did you mean ZZIMP2600010?',
      'check digit',
      '“3m”',
      'radio',
      '“100.5”',
      '01.01.2026',
    ]) {
      expect(first).toContain(words)
    }
    expect(report[2]?.messages).toEqual(['A new recording needs a title and an artist.'])
    expect(report[3]?.messages).toEqual(['title differs from line 3 of the same ISRC.'])
    expect(report[4]?.messages[0]).toContain('no work is named')
    expect(report[5]?.messages[0]).toContain('needs a party')
    expect(report[6]?.messages).toEqual(['valid_to is before valid_from.'])
    expect(found.refused).toBe(6)
    expect(await recordingBy('ZZIMP2600012')).toBeUndefined()
  })

  it('is warned of, and taken, for a doubtful IPI, a prefix nobody was allotted, and a formula', async () => {
    const { report } = await importRows([
      {
        isrc: 'XXIMP2600020',
        title: '=HYPERLINK("http://x")',
        artist: '@band',
        party_ipi: '00014107339',
        ...share('-Label', '100'),
      },
    ])
    expect(report[0]?.outcome).toBe('created')
    const messages = report[0]?.messages.join(' ') ?? ''
    for (const words of [
      'prefix XX',
      'title begins as a formula',
      'artist begins',
      'party_name begins',
      'check digits',
    ]) {
      expect(messages).toContain(words)
    }
    expect((await recordingBy('XXIMP2600020'))?.title).toBe('=HYPERLINK("http://x")')
  })
})

describe('shares of a file', () => {
  it('over the whole are refused together with the sum, and the recording stands', async () => {
    const { report } = await importRows([
      { isrc: 'ZZIMP2600030', title: 'Contested', artist: 'Band' },
      { isrc: 'ZZIMP2600030', ...share('Left', '60') },
      { isrc: 'ZZIMP2600030', ...share('Right', '50') },
    ])
    expect(report.map(({ outcome }) => outcome)).toEqual(['created', 'refused', 'refused'])
    expect(report[1]?.messages[0]).toContain('110 % from 2026-01-01 on')
    expect((await recordingBy('ZZIMP2600030'))?.shares.items).toEqual([])
    const { items } = await clerk.json(listParties, { query: { search: 'Left' } })
    expect(items).toEqual([])
  })

  it('are counted with those held', async () => {
    const recordingId = await addRecording(api.database, { isrc: 'ZZIMP2600031', title: 'Held' })
    await addShare(api.database, await addParty(api.database, 'Holder'), { recordingId })
    const { report } = await importRows([{ isrc: 'ZZIMP2600031', ...share('Newcomer', '0.0001') }])
    expect(report[0]).toMatchObject({ outcome: 'refused' })
    expect(report[0]?.messages[0]).toContain('100.0001 %')
  })

  it('under the whole are taken with a warning of what will be held back', async () => {
    const { found, report } = await importRows([
      { isrc: 'ZZIMP2600032', title: 'Partly claimed', artist: 'Band', ...share('Only one', '75') },
    ])
    expect(found).toMatchObject({ created: 1, warnings: 1 })
    expect(report[0]?.messages[0]).toContain('held back will be 25 % from 2026-01-01 on')
  })

  it('are one share when a line repeats, and refused when it contradicts', async () => {
    const line: Row = { isrc: 'ZZIMP2600033', title: 'Twice', artist: 'Band', ...share('Repeater', '100') }
    const { report } = await importRows([line, line, { ...line, share_percent: '40' }])
    expect(report.map(({ outcome }) => outcome)).toEqual(['created', 'unchanged', 'refused'])
    expect(report[1]?.messages).toEqual(['This share stands in line 2 already.'])
  })

  it('of a party named only by a name that several have are refused', async () => {
    await addParty(api.database, 'Namesake')
    await addParty(api.database, 'Namesake')
    const { report } = await importRows([
      { isrc: 'ZZIMP2600034', title: 'Whose', artist: 'Band', ...share('namesake', '100') },
    ])
    expect(report[0]).toMatchObject({
      outcome: 'refused',
      messages: ['Several parties are called “namesake”. Give the IPI.'],
    })
  })
})

describe('a file', () => {
  const header = catalogueCsvColumns.join(',')
  const latin1 = Buffer.concat([
    Buffer.from(`${header}\nZZIMP2600040,`),
    Buffer.from([0x4d, 0xfc]),
    Buffer.from(',Band\n'),
  ])

  it.each([
    ['in Latin-1', latin1, 'not in UTF-8: line 2'],
    ['in UTF-16', Buffer.from(`\uFEFF${header}`, 'utf16le'), 'UTF-16'],
    ['empty', Buffer.from(''), 'empty'],
    ['with a header alone', Buffer.from(`${header}\n`), 'no row below'],
    ['with other columns', Buffer.from('isrc,title,label\nx,y,z\n'), 'missing: artist, duration'],
    ['with an unknown column', Buffer.from(`${header},mood\nx\n`), 'not known: mood'],
    [
      'with a quotation mark left open',
      Buffer.from(`${header}\nZZIMP2600041,Fine,Band\nZZIMP2600042,"Open,Band\nZZIMP2600043,x,y\n`),
      'opened in line 3 is never closed',
    ],
    ['with a stray quotation mark', Buffer.from(`${header}\nZZIMP2600041,"Fine" not,Band\n`), 'In line 2'],
    [
      'of too many rows',
      Buffer.from(`${header}\n${'ZZIMP2600044,x,y\n'.repeat(20_001)}`),
      'more than 20,000 rows',
    ],
  ])('%s is refused in words, and nothing of it is taken', async (_what, bytes, words) => {
    const { total } = await clerk.json(listCatalogueImports)
    const problem = await clerk.problem(importCatalogue, { form: formWith(new Blob([bytes]), 'bad.csv') })
    expect(problem).toMatchObject({ code: 'file-refused', status: 422, fieldErrors: [{ path: 'file' }] })
    expect(problem.detail).toContain(words)
    expect((await clerk.json(listCatalogueImports)).total).toBe(total)
    expect(await recordingBy('ZZIMP2600041')).toBeUndefined()
  })

  it('of more than 20 MB is refused', async () => {
    const bytes = new Blob([header, '\n', 'x'.repeat(20 * 1024 ** 2)])
    expect(await clerk.problem(importCatalogue, { form: formWith(bytes, 'big.csv') })).toMatchObject({
      status: 413,
    })
  })

  it('reports as CSV in which no text runs as a formula', async () => {
    const { found } = await importRows([{ isrc: '=1+1', title: '+SUM(A1)', artist: 'x' }])
    const answer = await clerk.call(exportCatalogueImportRows, {
      params: { importId: found.id },
      query: { outcome: 'refused' },
    })
    expect(answer.headers.get('content-type')).toContain('text/csv')
    expect(answer.text).toContain(`2,'=1+1,'+SUM(A1),refused,`)
    const none = await clerk.call(exportCatalogueImportRows, {
      params: { importId: found.id },
      query: { outcome: 'created' },
    })
    expect(none.text.trim().split('\n')).toHaveLength(1)
  })

  it('of several thousand rows is taken in seconds, and again without a change', async () => {
    const rows = Array.from({ length: 5000 }, (_, index): Row => {
      const isrc = `ZZBIG${String(2_600_000 + Math.floor(index / 2)).padStart(7, '0')}`
      return {
        isrc,
        title: `Big ${isrc}`,
        artist: 'Band',
        ...share(index % 2 === 0 ? 'Big left' : 'Big right', '50'),
      }
    })
    expect(await importing(csv(rows))).toMatchObject({ rows: 5000, created: 5000, refused: 0, warnings: 0 })
    expect(await importing(csv(rows))).toMatchObject({ rows: 5000, unchanged: 5000 })
  })
})
