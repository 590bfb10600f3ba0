import type { DistributionId, Instant, PartyId, RecordingId, StationId, WorkId } from '@fieldfare/contracts'
import type { Connection, Transaction } from '../connection.ts'

/** One calculation of one month, as a worker takes it up. */
export type DistributionRun = {
  id: DistributionId
  /** First day of the month, YYYY-MM-01. */
  month: string
  status: string
  currency: string
  currencyDigits: number
  rulesVersion: string
  minimumMs: number
  capMs: number | null
  questionDays: number
  digest: string | null
  approvedAt: Instant | null
  requestedAt: Instant
  /** When the statements were first asked for; null before. */
  issueRequestedAt: Instant | null
}

export async function lockDistributionRun(
  trx: Transaction,
  id: DistributionId,
): Promise<DistributionRun | null> {
  const row: DistributionRun | undefined = await trx('distributions as d')
    .join('distribution_rules as r', 'r.version', 'd.rules_version')
    .where('d.id', id)
    .forUpdate('d')
    .first(
      {
        id: 'd.id',
        month: 'd.month',
        status: 'd.status',
        currency: 'd.currency',
        currencyDigits: 'd.currency_digits',
        rulesVersion: 'd.rules_version',
        digest: 'd.digest',
        approvedAt: 'd.approved_at',
        requestedAt: 'd.requested_at',
        questionDays: 'r.question_days',
      },
      trx.raw('r.minimum_ms::float8 as "minimumMs"'),
      trx.raw('r.cap_ms::float8 as "capMs"'),
      // One job makes the statements of a run, however often it is tried again.
      trx.raw(
        `(select created_at from jobs where dedupe_key = 'render-statements-' || d.id) as "issueRequestedAt"`,
      ),
    )
  return row ?? null
}

export async function listDeductionRules(
  connection: Connection,
  rulesVersion: string,
): Promise<{ code: string; label: string; ratePpm: number }[]> {
  return connection('deduction_rules')
    .where({ rules_version: rulesVersion })
    .orderBy('position')
    .select({ code: 'code', label: 'label', ratePpm: 'rate_ppm' })
}

export type MonthLicence = {
  stationId: StationId
  stationName: string
  monthlyFeeMinor: bigint
  worksPartPpm: number
  coveredDays: number
  daysInMonth: number
  heldSeconds: number
  expectedSeconds: number
}

/**
 * Licences of the month with the days they cover and how much airtime of those days is held. Days are the station's:
 * a day on which clocks change has 23 or 25 hours.
 */
export async function listMonthLicences(connection: Connection, month: string): Promise<MonthLicence[]> {
  const result: { rows: MonthLicence[] } = await connection.raw(
    `with covered as (
       select l.station_id, s.name, s.time_zone, l.monthly_fee_minor, l.works_part_ppm,
         greatest(l.valid_from, m.first_day) as from_day,
         least(coalesce(l.valid_to, m.last_day), m.last_day) as to_day,
         extract(day from m.last_day)::int as days_in_month
       from licences l
       join stations s on s.id = l.station_id
       cross join (
         select :month::date as first_day, (:month::date + interval '1 month' - interval '1 day')::date as last_day
       ) m
       where daterange(l.valid_from, l.valid_to, '[]') && daterange(m.first_day, m.last_day, '[]')
     ), placed as (
       select *, tstzrange(
         from_day::timestamp at time zone time_zone, (to_day + 1)::timestamp at time zone time_zone
       ) as stretch
       from covered
     )
     select p.station_id as "stationId", p.name as "stationName", p.monthly_fee_minor as "monthlyFeeMinor",
       p.works_part_ppm as "worksPartPpm", (p.to_day - p.from_day + 1)::int as "coveredDays",
       p.days_in_month as "daysInMonth",
       extract(epoch from upper(p.stretch) - lower(p.stretch))::float8 as "expectedSeconds",
       coalesce((
         select sum(extract(epoch from upper(g.airtime * p.stretch) - lower(g.airtime * p.stretch)))
         from station_logs g
         where g.station_id = p.station_id and g.airtime && p.stretch and g.status <> 'rejected'
       ), 0)::float8 as "heldSeconds"
     from placed p order by p.station_id, p.from_day`,
    { month },
  )
  return result.rows
}

export type MonthPlay = {
  id: string
  stationId: StationId
  recordingId: RecordingId
  workId: WorkId | null
  localDay: string
  creditedMs: number
}

/** Counted plays of the month on days for which their station has a licence: on other days there is no fee to share. */
export async function listMonthPlays(connection: Connection, month: string): Promise<MonthPlay[]> {
  return connection('plays as p')
    .join('recordings as r', 'r.id', 'p.recording_id')
    .where('p.status', 'counted')
    .whereRaw("p.local_day >= ?::date and p.local_day < (?::date + interval '1 month')", [month, month])
    .whereExists(
      connection('licences as l')
        .whereRaw('l.station_id = p.station_id')
        .whereRaw("p.local_day <@ daterange(l.valid_from, l.valid_to, '[]')")
        .select(connection.raw('1')),
    )
    .orderBy('p.id')
    .select<MonthPlay[]>(
      {
        id: 'p.id',
        stationId: 'p.station_id',
        recordingId: 'p.recording_id',
        workId: 'r.work_id',
        localDay: 'p.local_day',
      },
      connection.raw('(round(extract(epoch from p.ended_at - p.started_at) * 1000))::float8 as "creditedMs"'),
    )
}

export type MonthShare = {
  workId: WorkId | null
  recordingId: RecordingId | null
  partyId: PartyId
  sharePpm: number
  validFrom: string
  validTo: string | null
}

/** Shares of everything that was played in the month, whatever their validity: what was not valid is explained. */
export async function listMonthShares(connection: Connection, month: string): Promise<MonthShare[]> {
  const played = connection('plays as p')
    .where('p.status', 'counted')
    .whereRaw("p.local_day >= ?::date and p.local_day < (?::date + interval '1 month')", [month, month])
  return connection('shares as s')
    .whereIn('s.recording_id', played.clone().select('p.recording_id'))
    .orWhereIn(
      's.work_id',
      played
        .clone()
        .join('recordings as r', 'r.id', 'p.recording_id')
        .whereNotNull('r.work_id')
        .select('r.work_id'),
    )
    .orderBy('s.id')
    .select<MonthShare[]>({
      workId: 's.work_id',
      recordingId: 's.recording_id',
      partyId: 's.party_id',
      sharePpm: 's.share_ppm',
      validFrom: 's.valid_from',
      validTo: 's.valid_to',
    })
}

export async function listPayees(
  connection: Connection,
  partyIds: readonly string[],
): Promise<{ id: PartyId; name: string; ipi: string | null }[]> {
  return connection('parties')
    .whereIn('id', [...partyIds])
    .orderBy(['name', 'id'])
    .select({ id: 'id', name: 'name', ipi: 'ipi' })
}

export type SubjectNames = { title: string; artist: string; code: string | null }

/** How works and recordings are called on statements, by id. */
export async function readSubjectNames(
  connection: Connection,
  ids: { workIds: readonly string[]; recordingIds: readonly string[] },
): Promise<Map<string, SubjectNames>> {
  const works: (SubjectNames & { id: string })[] = await connection('works')
    .whereIn('id', [...ids.workIds])
    .select({ id: 'id', title: 'title', artist: 'creators', code: 'iswc' })
  const recordings: (SubjectNames & { id: string })[] = await connection('recordings')
    .whereIn('id', [...ids.recordingIds])
    .select({ id: 'id', title: 'title', artist: 'artist', code: 'isrc' })
  return new Map([...works, ...recordings].map(({ id, ...names }) => [id, names]))
}

export async function readStationNames(connection: Connection): Promise<Map<string, string>> {
  const rows: { id: string; name: string }[] = await connection('stations').select({ id: 'id', name: 'name' })
  return new Map(rows.map(({ id, name }) => [id, name]))
}

/** A run that could not be calculated: it says why, and the month is open again. */
export async function markDistributionFailed(
  trx: Transaction,
  id: DistributionId,
  reason: string,
): Promise<void> {
  const rows: { month: string }[] = await trx('distributions')
    .where({ id, status: 'calculating' })
    .update({ status: 'failed', failure: reason })
    .returning('month')
  const [row] = rows
  if (row !== undefined)
    await trx('distribution_months').where({ month: row.month }).update({ status: 'open' })
}

/** The last word on a month: its statements are made and it never changes again. */
export async function markDistributionIssued(trx: Transaction, run: DistributionRun): Promise<void> {
  await trx('distributions').where({ id: run.id }).update({ status: 'issued', issued_at: trx.fn.now() })
  await trx('distribution_months').where({ month: run.month }).update({ status: 'issued' })
}
