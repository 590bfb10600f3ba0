import type { LicenceId, LocalDate, StationId } from '@fieldfare/contracts'
import { restrictToStations, type Connection, type Scope, type Transaction } from '@fieldfare/database'

export type LicenceTerms = {
  validFrom: LocalDate
  validTo: LocalDate | null
  monthlyFeeMinor: string
  worksPartPpm: number
}

export type LicenceRecord = LicenceTerms & { id: LicenceId }

export type StationProfile = { callName: string; name: string; timeZone: string; contactEmail: string | null }

export type StationRecord = StationProfile & { id: StationId; licences: LicenceRecord[] }

/** Amounts leave as text: a JSON number would lose figures beyond 2^53. */
const licencesOfStation = `coalesce((
  select jsonb_agg(jsonb_build_object('id', licences.id, 'validFrom', licences.valid_from, 'validTo', licences.valid_to,
    'monthlyFeeMinor', licences.monthly_fee_minor::text, 'worksPartPpm', licences.works_part_ppm)
    order by licences.valid_from desc)
  from licences where licences.station_id = stations.id), '[]') as licences`

function selectStations(connection: Connection, scope: Scope) {
  return restrictToStations(
    connection('stations').select<StationRecord[]>(
      {
        id: 'stations.id',
        callName: 'stations.call_name',
        name: 'stations.name',
        timeZone: 'stations.time_zone',
        contactEmail: 'stations.contact_email',
      },
      connection.raw(licencesOfStation),
    ),
    scope,
    'stations.id',
  )
}

export async function listStationsInScope(connection: Connection, scope: Scope): Promise<StationRecord[]> {
  return selectStations(connection, scope).orderBy([{ column: 'stations.name' }, { column: 'stations.id' }])
}

export async function findStation(
  connection: Connection,
  scope: Scope,
  id: StationId,
): Promise<StationRecord | null> {
  const row: StationRecord | undefined = await selectStations(connection, scope)
    .where('stations.id', id)
    .first()
  return row ?? null
}

export async function findStationByCallName(
  connection: Connection,
  callName: string,
): Promise<{ id: StationId; name: string } | null> {
  const row: { id: StationId; name: string } | undefined = await connection('stations')
    .where({ call_name: callName })
    .first('id', 'name')
  return row ?? null
}

/** Locks the row, so that changes to a station and its licences happen one after the other. */
export async function lockStation(trx: Transaction, id: StationId): Promise<boolean> {
  const rows: unknown[] = await trx('stations').where({ id }).forUpdate().select('id')
  return rows.length === 1
}

export async function holdsLogs(connection: Connection, id: StationId): Promise<boolean> {
  const row: unknown = await connection('station_logs').where({ station_id: id }).first('id')
  return row !== undefined
}

function profileColumns(profile: StationProfile) {
  return {
    call_name: profile.callName,
    name: profile.name,
    time_zone: profile.timeZone,
    contact_email: profile.contactEmail,
  }
}

/** @throws ConstraintViolation stations_call_name_key */
export async function insertStation(trx: Transaction, profile: StationProfile): Promise<StationId> {
  const rows: { id: StationId }[] = await trx('stations').insert(profileColumns(profile)).returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new station came back without an id')
  return row.id
}

/** @throws ConstraintViolation stations_call_name_key */
export async function updateStationProfile(
  trx: Transaction,
  id: StationId,
  profile: StationProfile,
): Promise<void> {
  await trx('stations').where({ id }).update(profileColumns(profile))
}

function termsColumns(terms: LicenceTerms) {
  return {
    valid_from: terms.validFrom,
    valid_to: terms.validTo,
    monthly_fee_minor: terms.monthlyFeeMinor,
    works_part_ppm: terms.worksPartPpm,
  }
}

/** @throws ConstraintViolation licences_no_overlap */
export async function insertLicence(
  trx: Transaction,
  stationId: StationId,
  terms: LicenceTerms,
): Promise<LicenceId> {
  const rows: { id: LicenceId }[] = await trx('licences')
    .insert({ station_id: stationId, ...termsColumns(terms) })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new licence came back without an id')
  return row.id
}

/** @throws ConstraintViolation licences_no_overlap */
export async function updateLicenceTerms(
  trx: Transaction,
  id: LicenceId,
  terms: LicenceTerms,
): Promise<void> {
  await trx('licences').where({ id }).update(termsColumns(terms))
}

export async function lockLicence(
  trx: Transaction,
  id: LicenceId,
): Promise<(LicenceTerms & { stationId: StationId }) | null> {
  const row: (LicenceTerms & { stationId: StationId }) | undefined = await trx('licences')
    .where({ id })
    .forUpdate()
    .first(
      {
        stationId: 'station_id',
        validFrom: 'valid_from',
        validTo: 'valid_to',
        worksPartPpm: 'works_part_ppm',
      },
      trx.raw('monthly_fee_minor::text as "monthlyFeeMinor"'),
    )
  return row ?? null
}

/** The licence of the station that holds one of these days, apart from the one named. */
export async function findLicenceWithin(
  connection: Connection,
  stationId: StationId,
  terms: LicenceTerms,
  except: LicenceId | null,
): Promise<{ validFrom: LocalDate; validTo: LocalDate | null } | null> {
  const query = connection('licences')
    .where({ station_id: stationId })
    .whereRaw("daterange(valid_from, valid_to, '[]') && daterange(?, ?, '[]')", [
      terms.validFrom,
      terms.validTo,
    ])
    .orderBy('valid_from')
  if (except !== null) query.whereNot({ id: except })
  const row: { validFrom: LocalDate; validTo: LocalDate | null } | undefined = await query.first({
    validFrom: 'valid_from',
    validTo: 'valid_to',
  })
  return row ?? null
}
