import { retryReferenceAudio, type ReferenceAudioView } from '@fieldfare/contracts'
import { useMutation, useQueryClient } from '@tanstack/react-query'
import { RotateCw } from 'lucide-react'
import { Button } from '../../components/button.tsx'
import { Code, Count, Duration } from '../../components/figures.tsx'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { ErrorState } from '../../components/states.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { formatBytes } from '../../lib/format.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { ReferenceStatusTag } from './reference-status.tsx'
import type { ReferenceFractions } from './use-reference-progress.ts'

type ReferenceAudioListProps = {
  items: readonly ReferenceAudioView[]
  fractions: ReferenceFractions
  /** Names the recording in each entry, where the list is of many recordings. */
  withRecording: boolean
  canRetry: boolean
}

/** Reference audio with its state, live; what failed says why. */
export function ReferenceAudioList({ items, fractions, withRecording, canRetry }: ReferenceAudioListProps) {
  return (
    <ul className="divide-y divide-hairline border-b border-hairline">
      {items.map((audio) => (
        <li
          key={audio.id}
          className="grid gap-x-6 gap-y-1 py-3 sm:grid-cols-[minmax(0,1fr)_minmax(14rem,auto)]"
        >
          <div className="min-w-0">
            {withRecording && (
              <p>
                <TextLink to={`/recordings/${audio.recording.id}`}>{audio.recording.title}</TextLink>
                <span className="text-slate"> {audio.recording.artist} </span>
                <Code kind="isrc" value={audio.recording.isrc} />
              </p>
            )}
            <p className="break-all">{audio.fileName}</p>
            <AudioFacts audio={audio} />
          </div>
          <AudioState audio={audio} fraction={fractions.get(audio.id) ?? null} canRetry={canRetry} />
        </li>
      ))}
    </ul>
  )
}

function AudioFacts({ audio }: { audio: ReferenceAudioView }) {
  return (
    <p className="flex flex-wrap gap-x-3 text-sm text-slate">
      {audio.format !== null && <span>{audio.format}</span>}
      {audio.durationSeconds !== null && <Duration seconds={audio.durationSeconds} />}
      <span>{formatBytes(audio.sizeBytes)}</span>
      {audio.landmarkHashes !== null && (
        <span>
          <Count value={audio.landmarkHashes} /> landmark hashes
        </span>
      )}
      <span>
        Sent by {audio.uploadedByName}, <SocietyTime instant={audio.uploadedAt} />
      </span>
    </p>
  )
}

type AudioStateProps = { audio: ReferenceAudioView; fraction: number | null; canRetry: boolean }

function AudioState({ audio, fraction, canRetry }: AudioStateProps) {
  const queryClient = useQueryClient()
  const retrying = useMutation({
    mutationFn: () => callApi(retryReferenceAudio, { params: { referenceAudioId: audio.id } }),
    onSuccess: () => refreshScopes(queryClient, 'reference-audio'),
  })
  if (audio.status === 'fingerprinting')
    return <ProgressBar label="Being fingerprinted" fraction={fraction} />
  return (
    <div className="grid content-start gap-1 sm:justify-items-end sm:text-right">
      <ReferenceStatusTag status={audio.status} />
      {audio.failure !== null && <p className="max-w-prose text-sm">{audio.failure}</p>}
      {audio.status === 'failed' && canRetry && (
        <Button icon={RotateCw} busy={retrying.isPending} onClick={() => retrying.mutate()}>
          Try again
        </Button>
      )}
      {retrying.error !== null && <ErrorState error={retrying.error} />}
    </div>
  )
}
