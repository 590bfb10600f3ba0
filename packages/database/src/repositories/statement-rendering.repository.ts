import type { DistributionId, Instant, PartyId, Right, StatementId } from '@fieldfare/contracts'
import type { Connection, Transaction } from '../connection.ts'

export type StatementToRender = {
  id: StatementId
  number: string
  partyId: PartyId
  partyName: string
  partyIpi: string | null
  grossMinor: bigint
  netMinor: bigint
}

/** Statements of a run that have not both files yet, in order of their number. */
export async function listStatementsToRender(
  connection: Connection,
  distributionId: DistributionId,
): Promise<StatementToRender[]> {
  return connection('statements as s')
    .where('s.distribution_id', distributionId)
    .whereRaw('(select count(*) from statement_files f where f.statement_id = s.id) < 2')
    .orderBy('s.number')
    .select<StatementToRender[]>({
      id: 's.id',
      number: 's.number',
      partyId: 's.party_id',
      partyName: 's.party_name',
      partyIpi: 's.party_ipi',
      grossMinor: 's.gross_minor',
      netMinor: 's.net_minor',
    })
}

export type RenderedStation = {
  stationId: string
  name: string
  timeZone: string
  grossMinor: bigint
  deductionsMinor: bigint
  netMinor: bigint
  heldSeconds: number
  expectedSeconds: number
}

export type RenderedLine = {
  lineNumber: number
  right: Right
  stationId: string
  title: string
  artist: string
  code: string | null
  creditedMs: bigint
  sharePpm: number
  amountMinor: bigint
}

export type RenderedPlay = {
  lineNumber: number
  playId: string
  startedAt: Instant
  recordingTitle: string
  durationSeconds: number
  creditedSeconds: number
}

export type RenderedHoldback = {
  title: string
  artist: string
  stationName: string
  right: Right
  reason: string
  amountMinor: bigint
}

export type StatementContents = {
  stations: RenderedStation[]
  deductions: { label: string; ratePpm: number; amountMinor: bigint }[]
  lines: RenderedLine[]
  plays: RenderedPlay[]
  holdbacks: RenderedHoldback[]
}

/** Everything a statement shows, as it was written when the month was calculated. */
export async function readStatementContents(
  connection: Connection,
  id: StatementId,
): Promise<StatementContents> {
  const stations = await connection('statement_stations as t')
    .join('stations as s', 's.id', 't.station_id')
    .where('t.statement_id', id)
    .orderBy(['s.name', 's.id'])
    .select<RenderedStation[]>(
      {
        stationId: 't.station_id',
        name: 's.name',
        timeZone: 's.time_zone',
        grossMinor: 't.gross_minor',
        deductionsMinor: 't.deductions_minor',
        netMinor: 't.net_minor',
      },
      connection.raw('(t.held_ms / 1000.0)::float8 as "heldSeconds"'),
      connection.raw('(t.expected_ms / 1000.0)::float8 as "expectedSeconds"'),
    )
  const deductions: StatementContents['deductions'] = await connection('statement_deductions')
    .where({ statement_id: id })
    .orderBy('position')
    .select({ label: 'label', ratePpm: 'rate_ppm', amountMinor: 'amount_minor' })
  const lines = await connection('statement_lines')
    .where({ statement_id: id })
    .orderBy('line_number')
    .select<RenderedLine[]>({
      lineNumber: 'line_number',
      right: 'right',
      stationId: 'station_id',
      title: 'title',
      artist: 'artist',
      code: 'code',
      creditedMs: 'credited_ms',
      sharePpm: 'share_ppm',
      amountMinor: 'amount_minor',
    })
  const plays = await connection('statement_line_plays as l')
    .join('plays as p', 'p.id', 'l.play_id')
    .join('recordings as r', 'r.id', 'p.recording_id')
    .where('l.statement_id', id)
    .orderBy(['l.line_number', 'p.started_at', 'p.id'])
    .select<RenderedPlay[]>(
      { lineNumber: 'l.line_number', playId: 'p.id', startedAt: 'p.started_at', recordingTitle: 'r.title' },
      connection.raw('extract(epoch from p.ended_at - p.started_at)::float8 as "durationSeconds"'),
      connection.raw('(l.credited_ms / 1000.0)::float8 as "creditedSeconds"'),
    )
  const holdbacks: RenderedHoldback[] = await connection('statement_holdbacks as t')
    .join('distribution_holdbacks as h', 'h.id', 't.holdback_id')
    .join('stations as s', 's.id', 'h.station_id')
    .leftJoin('works as w', 'w.id', 'h.work_id')
    .leftJoin('recordings as r', 'r.id', 'h.recording_id')
    .where('t.statement_id', id)
    .orderBy(['s.name', 'h.right', 'h.subject', 'h.id'])
    .select<RenderedHoldback[]>(
      { stationName: 's.name', right: 'h.right', reason: 'h.reason', amountMinor: 'h.amount_minor' },
      connection.raw('coalesce(w.title, r.title, h.subject) as title'),
      connection.raw(`coalesce(w.creators, r.artist, '') as artist`),
    )
  return { stations, deductions, lines, plays, holdbacks }
}

export async function saveStatementFile(
  trx: Transaction,
  file: {
    statementId: StatementId
    kind: 'pdf' | 'csv'
    storageKey: string
    sizeBytes: number
    sha256: Buffer
  },
): Promise<void> {
  await trx('statement_files')
    .insert({
      statement_id: file.statementId,
      kind: file.kind,
      storage_key: file.storageKey,
      size_bytes: file.sizeBytes,
      sha256: file.sha256,
    })
    .onConflict(['statement_id', 'kind'])
    .ignore()
}

export type PublisherToTell = { email: string; name: string; partyName: string; number: string }

/** People who may see the statements of a run: one entry a person and statement. */
export async function listPublishersToTell(
  connection: Connection,
  distributionId: DistributionId,
): Promise<PublisherToTell[]> {
  return connection('statements as s')
    .join('user_parties as up', 'up.party_id', 's.party_id')
    .join('users as u', 'u.id', 'up.user_id')
    .where('s.distribution_id', distributionId)
    .where({ 'u.role': 'publisher', 'u.status': 'active' })
    .orderBy(['u.email', 's.number'])
    .select({ email: 'u.email', name: 'u.name', partyName: 's.party_name', number: 's.number' })
}
