import {
  readIsrc,
  type EndpointResult,
  type getParty,
  type getRecording,
  type getWork,
} from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import type { ShareRecord } from '../../shares/shares.repository.ts'
import { canEditCatalogue } from './catalogue.policy.ts'
import type { PartyRecord } from './parties.repository.ts'
import type { RecordingRecord } from './recordings.repository.ts'
import type { WorkRecord } from './works.repository.ts'

/** Who looks, and which day it is for the society: it decides which shares count as valid now. */
export type Viewer = { actor: Pick<Actor, 'role'>; today: string }

export function presentParty(party: PartyRecord, { actor }: Viewer): EndpointResult<typeof getParty> {
  return {
    id: party.id,
    name: party.name,
    ipi: party.ipi,
    ipiCheckOk: party.ipiCheckOk,
    works: party.works,
    recordings: party.recordings,
    canEdit: canEditCatalogue(actor),
  }
}

function presentShares(shares: readonly ShareRecord[], today: string) {
  const validToday = shares.filter(
    ({ validFrom, validTo }) => validFrom <= today && (validTo === null || validTo >= today),
  )
  return {
    items: shares.map((share) => ({
      id: share.id,
      party: { id: share.party.id, name: share.party.name },
      sharePpm: share.sharePpm,
      validFrom: share.validFrom,
      validTo: share.validTo,
    })),
    totalTodayPpm: validToday.reduce((sum, { sharePpm }) => sum + sharePpm, 0),
  }
}

export function presentWork(work: WorkRecord, { actor, today }: Viewer): EndpointResult<typeof getWork> {
  return {
    id: work.id,
    title: work.title,
    creators: work.creators,
    iswc: work.iswc,
    recordings: work.recordings.map(({ id, isrc, title, artist }) => ({ id, isrc, title, artist })),
    shares: presentShares(work.shares, today),
    canEdit: canEditCatalogue(actor),
  }
}

export function presentRecording(
  recording: RecordingRecord,
  { actor, today }: Viewer,
): EndpointResult<typeof getRecording> {
  const reading = readIsrc(recording.isrc)
  const { work } = recording
  return {
    id: recording.id,
    isrc: recording.isrc,
    isrcWarning: reading.ok ? reading.warning : null,
    title: recording.title,
    artist: recording.artist,
    durationSeconds: recording.durationSeconds,
    work: work === null ? null : { id: work.id, title: work.title, iswc: work.iswc },
    referenceStatus: recording.referenceStatus,
    shares: presentShares(recording.shares, today),
    plays: recording.plays,
    playedSeconds: recording.playedSeconds,
    lastPlayedAt: recording.lastPlayedAt,
    canEdit: canEditCatalogue(actor),
  }
}
