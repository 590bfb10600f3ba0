import type { EndpointResult, getStation } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import { canEditStations, canUploadLogs } from './stations.policy.ts'
import type { StationRecord } from './stations.repository.ts'

export function presentStation(station: StationRecord, actor: Actor): EndpointResult<typeof getStation> {
  return {
    id: station.id,
    callName: station.callName,
    name: station.name,
    timeZone: station.timeZone,
    contactEmail: station.contactEmail,
    licences: station.licences.map((licence) => ({
      id: licence.id,
      validFrom: licence.validFrom,
      validTo: licence.validTo,
      monthlyFeeMinor: licence.monthlyFeeMinor,
      worksPartPpm: licence.worksPartPpm,
    })),
    canUpload: canUploadLogs(actor),
    canEdit: canEditStations(actor),
  }
}
