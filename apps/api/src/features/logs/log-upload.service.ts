import { randomUUID } from 'node:crypto'
import { stationLogIdSchema, type LogUpload, type StationId, type StationLogId } from '@fieldfare/contracts'
import {
  enqueueJob,
  inTransaction,
  isStationInScope,
  recordAudit,
  violates,
  type Actor,
  type Connection,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { describeLocal, localMonthOf } from '../../airtime/local-time.ts'
import { checkAudioUpload } from '../../audio-uploads/check-audio-upload.ts'
import { keepUpload } from '../../audio-uploads/keep-upload.ts'
import { AppError, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import type { UploadedFile } from '../../http/upload.ts'
import { monthNotOpen } from '../../months/month-not-open.ts'
import { holdMonthStatus, readMonthStatus } from '../../records/month.repository.ts'
import type { StationReference } from '../../records/references.ts'
import {
  findLogAt,
  findSameLog,
  findUploadStation,
  insertLog,
  lockUploadStation,
  type HeldLog,
  type NewLog,
} from './log-changes.repository.ts'
import { readLogStart } from './log-start.ts'

/** Recorders overlap their files a little; the worker cuts as much off. */
const OVERLAP_TOLERANCE_MS = 2000

function describeHeld(held: HeldLog): string {
  const { station } = held
  return `${held.fileName} of ${station.name} (${station.callName}), beginning ${describeLocal(held.startedAt, station.timeZone)} ${station.timeZone}`
}

function duplicateLog(held: HeldLog | null, scope: Scope): AppError {
  // What somebody else's station sends is not for everybody to read.
  const isTellable = held !== null && isStationInScope(scope, held.station.id)
  const which = isTellable ? describeHeld(held) : 'a log of another station'
  return new AppError('duplicate-log', { detail: `This very recording is held already: ${which}.` })
}

function overlappingLog(held: HeldLog): AppError {
  return new AppError('overlapping-log', {
    detail: `At this start the station's airtime is held already: ${describeHeld(held)}. Check the start; if that one is wrong, tell your royalty clerk.`,
  })
}

async function refuseHeld(
  connection: Connection,
  scope: Scope,
  log: Pick<NewLog, 'stationId' | 'sha256' | 'startedAt'>,
) {
  const same = await findSameLog(connection, log.sha256)
  if (same !== null) throw duplicateLog(same, scope)
  const overlapping = await findLogAt(connection, log.stationId, log.startedAt, OVERLAP_TOLERANCE_MS)
  if (overlapping !== null) throw overlappingLog(overlapping)
}

const CLOSED = 'A log that begins in it cannot be taken any more.'

async function recordLog(
  trx: Transaction,
  context: { actor: Actor; scope: Scope; station: StationReference },
  log: NewLog,
): Promise<void> {
  const { actor, scope, station } = context
  await lockUploadStation(trx, station.id)
  const month = localMonthOf(log.startedAt, station.timeZone)
  const status = await holdMonthStatus(trx, month)
  if (status !== 'open') throw monthNotOpen(month, status, CLOSED)
  await refuseHeld(trx, scope, log)
  await insertLog(trx, log)
  await enqueueJob(trx, {
    kind: 'analyse-log',
    payload: { logId: log.id },
    dedupeKey: `analyse-log-${log.id}-1`,
  })
  await recordAudit(trx, {
    actor,
    action: 'upload-log',
    subjectKind: 'station-log',
    subjectId: log.id,
    summary: `Sent ${log.fileName} for ${station.name}, beginning ${describeLocal(log.startedAt, station.timeZone)} (${station.timeZone}).`,
  })
}

export type LogUploadRequest = {
  actor: Actor
  scope: Scope
  stationId: StationId
  file: UploadedFile
  upload: LogUpload
}

/** Checks what can be checked at once, stores the file, and records log and job together. */
export async function receiveLog(
  dependencies: Dependencies,
  request: LogUploadRequest,
): Promise<StationLogId> {
  const { database, storage, clock } = dependencies
  const { actor, scope, file } = request
  const station = await findUploadStation(database, scope, request.stationId)
  if (station === null) throw notFound('This station')
  const startedAt = readLogStart(request.upload, clock())
  const month = localMonthOf(startedAt, station.timeZone)
  const status = await readMonthStatus(database, month)
  if (status !== 'open') throw monthNotOpen(month, status, CLOSED)
  const { format, sha256 } = await checkAudioUpload(file)
  await refuseHeld(database, scope, { stationId: station.id, sha256, startedAt })
  const id = stationLogIdSchema.parse(randomUUID())
  const log: NewLog = {
    id,
    stationId: station.id,
    fileName: file.originalName,
    sizeBytes: file.sizeBytes,
    sha256,
    storageKey: `logs/${id}`,
    format,
    startedAt,
    uploadedBy: actor.userId,
  }
  await keepUpload(storage, log.storageKey, file, () =>
    inTransaction(database, (trx) => recordLog(trx, { actor, scope, station }, log)),
  ).catch(async (error: unknown) => {
    if (!violates(error, 'station_logs_sha256_key')) throw error
    throw duplicateLog(await findSameLog(database, sha256), scope)
  })
  return id
}
