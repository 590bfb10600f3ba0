import { getRecording, type RecordingRef } from '@fieldfare/contracts'
import { useRole } from '../lib/session.ts'
import { TextLink } from './text-link.tsx'

/** Title and artist; the title leads to the recording for those who may read the catalogue. */
export function RecordingName({ recording }: { recording: Pick<RecordingRef, 'id' | 'title' | 'artist'> }) {
  const role = useRole()
  const isLinked = getRecording.access.some((reader) => reader === role)
  return (
    <span className="block min-w-0">
      {isLinked ? (
        <TextLink to={`/recordings/${recording.id}`}>{recording.title}</TextLink>
      ) : (
        <span>{recording.title}</span>
      )}
      <span className="block text-sm text-slate">{recording.artist}</span>
    </span>
  )
}
