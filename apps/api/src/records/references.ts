import type { RecordingId, StationId, WorkId } from '@fieldfare/contracts'

/** How rows name a station, a recording and a work: what every list shows of them. */
export type StationReference = { id: StationId; callName: string; name: string; timeZone: string }
export type RecordingReference = { id: RecordingId; isrc: string; title: string; artist: string }
export type WorkReference = { id: WorkId; title: string; iswc: string | null }

/** SQL for the references, for queries that join `stations`, `recordings` and `works` under these names. */
export const stationReferenceSql = `jsonb_build_object('id', stations.id, 'callName', stations.call_name,
  'name', stations.name, 'timeZone', stations.time_zone)`
export const recordingReferenceSql = `jsonb_build_object('id', recordings.id, 'isrc', recordings.isrc,
  'title', recordings.title, 'artist', recordings.artist)`
export const workReferenceSql = `case when works.id is not null then
  jsonb_build_object('id', works.id, 'title', works.title, 'iswc', works.iswc) end`
