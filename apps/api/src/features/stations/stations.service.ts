import type { StationId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  violates,
  type Actor,
  type Database,
  type Scope,
} from '@fieldfare/database'
import { AppError, fieldRefused, notFound } from '../../http/app-error.ts'
import {
  findStation,
  findStationByCallName,
  holdsLogs,
  insertStation,
  listStationsInScope,
  lockStation,
  updateStationProfile,
  type StationProfile,
  type StationRecord,
} from './stations.repository.ts'

const EVERYTHING: Scope = { kind: 'all' }

export function createStationsService({ database }: { database: Database }) {
  async function demand(scope: Scope, id: StationId): Promise<StationRecord> {
    const station = await findStation(database, scope, id)
    if (station === null) throw notFound('This station')
    return station
  }

  async function refuseCallName(callName: string): Promise<never> {
    const held = await findStationByCallName(database, callName)
    const message = `The call name ${callName} belongs to ${held === null ? 'another station' : held.name}.`
    throw new AppError('conflict', { detail: message, fieldErrors: [{ path: 'callName', message }] })
  }

  async function create(actor: Actor, profile: StationProfile): Promise<StationRecord> {
    const id = await inTransaction(database, async (trx) => {
      const stationId = await insertStation(trx, profile)
      await recordAudit(trx, {
        actor,
        action: 'create-station',
        subjectKind: 'station',
        subjectId: stationId,
        summary: `Added ${profile.name} (${profile.callName}) in ${profile.timeZone}.`,
      })
      return stationId
    }).catch((error: unknown) => {
      if (violates(error, 'stations_call_name_key')) return refuseCallName(profile.callName)
      throw error
    })
    return demand(EVERYTHING, id)
  }

  async function update(actor: Actor, id: StationId, profile: StationProfile): Promise<StationRecord> {
    await inTransaction(database, async (trx) => {
      if (!(await lockStation(trx, id))) throw notFound('This station')
      const before = await findStation(trx, EVERYTHING, id)
      if (before === null) throw notFound('This station')
      if (before.timeZone !== profile.timeZone && (await holdsLogs(trx, id))) {
        throw fieldRefused(
          'timeZone',
          'The time zone is fixed since logs of this station are held: their days and months depend on it.',
        )
      }
      const changes = describeProfileChanges(before, profile)
      if (changes === '') return
      await updateStationProfile(trx, id, profile)
      await recordAudit(trx, {
        actor,
        action: 'update-station',
        subjectKind: 'station',
        subjectId: id,
        summary: `Changed ${before.name}: ${changes}.`,
      })
    }).catch((error: unknown) => {
      if (violates(error, 'stations_call_name_key')) return refuseCallName(profile.callName)
      throw error
    })
    return demand(EVERYTHING, id)
  }

  return {
    list: (scope: Scope) => listStationsInScope(database, scope),
    get: demand,
    create,
    update,
  }
}

function describeProfileChanges(before: StationProfile, after: StationProfile): string {
  const changes: string[] = []
  if (before.callName !== after.callName) changes.push(`call name ${before.callName} → ${after.callName}`)
  if (before.name !== after.name) changes.push(`name “${before.name}” → “${after.name}”`)
  if (before.timeZone !== after.timeZone) changes.push(`time zone ${before.timeZone} → ${after.timeZone}`)
  // The trail holds no addresses of people.
  if (before.contactEmail !== after.contactEmail) changes.push('contact address')
  return changes.join(', ')
}
