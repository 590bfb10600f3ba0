import type { RecordingId } from '@fieldfare/contracts'
import type { Database, PageRequest, Scope } from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import {
  countPlaysByMonth,
  countPlaysByStation,
  isRecordingInScope,
  listPlays,
  streamPlays,
  type PlayFilter,
} from './plays.repository.ts'

export function createPlaysService(database: Database) {
  return {
    list: (scope: Scope, filter: PlayFilter & PageRequest) => listPlays(database, scope, filter),
    stream: (scope: Scope, filter: PlayFilter) => streamPlays(database, scope, filter),
    async countOfRecording(scope: Scope, recordingId: RecordingId) {
      if (!(await isRecordingInScope(database, scope, recordingId))) throw notFound('This recording')
      return {
        stations: await countPlaysByStation(database, scope, recordingId),
        months: await countPlaysByMonth(database, scope, recordingId),
      }
    },
  }
}
