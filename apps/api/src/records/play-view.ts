import type { EndpointResult, listPlays } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import type { PlayRow } from './play.repository.ts'

type PlayViewInput = EndpointResult<typeof listPlays>['items'][number]

/** Auditors dispute any play, publishers those in their scope; both only what counts and is not disputed yet. */
export function canDisputePlay(
  actor: Pick<Actor, 'role'>,
  play: Pick<PlayRow, 'status' | 'openDisputeId'>,
): boolean {
  const mayDispute = actor.role === 'auditor' || actor.role === 'publisher'
  return mayDispute && play.status === 'counted' && play.openDisputeId === null
}

/** A play of the actor's scope as the interface shows it. */
export function presentPlay(play: PlayRow, actor: Pick<Actor, 'role'>): PlayViewInput {
  const { station, recording, work } = play
  return {
    id: play.id,
    detectionId: play.detectionId,
    station: { id: station.id, callName: station.callName, name: station.name, timeZone: station.timeZone },
    recording: {
      id: recording.id,
      isrc: recording.isrc,
      title: recording.title,
      artist: recording.artist,
    },
    work: work === null ? null : { id: work.id, title: work.title, iswc: work.iswc },
    startedAt: play.startedAt,
    endedAt: play.endedAt,
    durationSeconds: play.durationSeconds,
    localDay: play.localDay,
    status: play.status,
    isInDispute: play.openDisputeId !== null,
    canDispute: canDisputePlay(actor, play),
  }
}
