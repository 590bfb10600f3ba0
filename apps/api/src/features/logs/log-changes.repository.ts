import type { Instant, LogStatus, StationId, StationLogId, UserId } from '@fieldfare/contracts'
import type { Connection, Scope, Transaction } from '@fieldfare/database'
import { restrictToStations } from '@fieldfare/database'
import { stationReferenceSql, type StationReference } from '../../records/references.ts'

export type NewLog = {
  id: StationLogId
  stationId: StationId
  fileName: string
  sizeBytes: number
  sha256: Buffer
  storageKey: string
  format: string
  startedAt: Date
  uploadedBy: UserId
}

export type HeldLog = { station: StationReference; fileName: string; startedAt: Instant }

export async function findUploadStation(
  connection: Connection,
  scope: Scope,
  id: StationId,
): Promise<StationReference | null> {
  const query = connection('stations').where('stations.id', id)
  const row: StationReference | undefined = await restrictToStations(query, scope, 'stations.id').first({
    id: 'stations.id',
    callName: 'stations.call_name',
    name: 'stations.name',
    timeZone: 'stations.time_zone',
  })
  return row ?? null
}

/** Uploads to one station are recorded one after the other, so that each sees the ones before. */
export async function lockUploadStation(trx: Transaction, id: StationId): Promise<void> {
  await trx('stations').where({ id }).forUpdate().select('id')
}

function selectHeldLogs(connection: Connection) {
  return connection('station_logs')
    .join('stations', 'stations.id', 'station_logs.station_id')
    .whereNot('station_logs.status', 'rejected')
    .orderBy('station_logs.started_at')
    .select<HeldLog[]>(
      { fileName: 'station_logs.file_name', startedAt: 'station_logs.started_at' },
      connection.raw(`${stationReferenceSql} as station`),
    )
}

/** The log held with these very bytes, at whatever station. */
export async function findSameLog(connection: Connection, sha256: Buffer): Promise<HeldLog | null> {
  const row: HeldLog | undefined = await selectHeldLogs(connection).where({ sha256 }).first()
  return row ?? null
}

/**
 * The log of the station that holds this moment and more than `toleranceMs` after it. Of logs not read yet only the
 * start is known: one that begins at the same moment counts too.
 */
export async function findLogAt(
  connection: Connection,
  stationId: StationId,
  moment: Date,
  toleranceMs: number,
): Promise<HeldLog | null> {
  const at = moment.toISOString()
  const tolerance = "? * interval '1 millisecond'"
  const row: HeldLog | undefined = await selectHeldLogs(connection)
    .where('station_logs.station_id', stationId)
    .whereRaw(
      `(airtime @> ?::timestamptz and upper(airtime) > ?::timestamptz + ${tolerance}
        or airtime is null and started_at between ?::timestamptz - ${tolerance} and ?::timestamptz + ${tolerance})`,
      [at, at, toleranceMs, at, toleranceMs, at, toleranceMs],
    )
    .first()
  return row ?? null
}

/** @throws ConstraintViolation station_logs_sha256_key */
export async function insertLog(trx: Transaction, log: NewLog): Promise<void> {
  await trx('station_logs').insert({
    id: log.id,
    station_id: log.stationId,
    file_name: log.fileName,
    size_bytes: log.sizeBytes,
    sha256: log.sha256,
    storage_key: log.storageKey,
    format: log.format,
    started_at: log.startedAt,
    uploaded_by: log.uploadedBy,
  })
}

export type LockedLog = {
  fileName: string
  status: LogStatus
  startedAt: Instant
  storageKey: string | null
  station: StationReference
}

export async function lockLog(trx: Transaction, id: StationLogId): Promise<LockedLog | null> {
  const row: LockedLog | undefined = await trx('station_logs')
    .join('stations', 'stations.id', 'station_logs.station_id')
    .where('station_logs.id', id)
    .forUpdate('station_logs')
    .first(
      {
        fileName: 'station_logs.file_name',
        status: 'station_logs.status',
        startedAt: 'station_logs.started_at',
        storageKey: 'station_logs.storage_key',
      },
      trx.raw(`${stationReferenceSql} as station`),
    )
  return row ?? null
}

/** What is known of the log stays until the new run has ended. */
export async function markLogQueued(trx: Transaction, id: StationLogId): Promise<void> {
  await trx('station_logs')
    .where({ id })
    .update({ status: 'queued', failure_code: null, failure_message: null })
}
