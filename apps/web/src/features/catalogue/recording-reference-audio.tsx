import { listReferenceAudio, uploadReferenceAudio, type RecordingView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { FileField } from '../../components/file-field.tsx'
import { Section } from '../../components/page-header.tsx'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { UnsavedGuard } from '../../components/unsaved-guard.tsx'
import { describeFailure } from '../../lib/api-problem.ts'
import { formatBytes } from '../../lib/format.ts'
import { useRole } from '../../lib/session.ts'
import { showToast } from '../../lib/toasts.ts'
import { uploadFile, type UploadProgress } from '../../lib/upload-file.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { referenceAudioQuery } from './catalogue-queries.ts'
import { acceptedAudio } from './accepted-audio.ts'
import { ReferenceAudioList } from './reference-audio-list.tsx'
import { useReferenceProgress } from './use-reference-progress.ts'

/** The sound a recording is known by: what is held, and a place to send one. */
export function RecordingReferenceAudio({ recording }: { recording: RecordingView }) {
  const fractions = useReferenceProgress()
  const role = useRole()
  const isListed = listReferenceAudio.access.some((reader) => reader === role)
  const audio = useQuery({
    ...referenceAudioQuery({ recordingId: recording.id }),
    enabled: isListed,
  })
  // Publishers see how far it is at the title, not the files.
  if (!isListed) return null
  return (
    <Section
      title="Reference audio"
      lead="The recording is found in station logs by the fingerprint of this sound."
    >
      <div className="grid gap-5">
        <QueryState query={audio} loading="Fetching the reference audio">
          {({ items }) =>
            items.length === 0 ? (
              <EmptyState title="No reference audio yet">
                Until it has one, this recording is not found in any log. Send the whole recording, in the
                best quality there is.
              </EmptyState>
            ) : (
              <ReferenceAudioList
                items={items}
                fractions={fractions}
                withRecording={false}
                canRetry={recording.canEdit}
              />
            )
          }
        </QueryState>
        {recording.canEdit && <SendReferenceAudio recordingId={recording.id} />}
      </div>
    </Section>
  )
}

function SendReferenceAudio({ recordingId }: { recordingId: string }) {
  const queryClient = useQueryClient()
  const [progress, setProgress] = useState<UploadProgress | null>(null)
  const [failure, setFailure] = useState<string | undefined>(undefined)
  const [files, setFiles] = useState<readonly File[]>([])

  const send = async (chosen: readonly File[]) => {
    const [file] = chosen
    setFiles(chosen)
    if (file === undefined) return
    setFailure(undefined)
    setProgress({ sentBytes: 0, totalBytes: file.size, secondsLeft: null })
    try {
      await uploadFile(uploadReferenceAudio, { fields: { recordingId }, file, onProgress: setProgress })
      setFiles([])
      showToast('The audio is here and waits to be fingerprinted.')
      await refreshScopes(queryClient, 'reference-audio', 'recordings')
    } catch (error) {
      setFailure(describeFailure(error).detail)
    } finally {
      setProgress(null)
    }
  }

  return (
    <div className="grid max-w-2xl gap-3">
      <FileField
        label="Send reference audio"
        hint="MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC. It is sent at once."
        accept={acceptedAudio}
        error={failure}
        files={files}
        disabled={progress !== null}
        onFilesChange={(chosen) => void send(chosen)}
      />
      {progress !== null && (
        <ProgressBar
          label="Sending"
          fraction={progress.totalBytes === 0 ? null : progress.sentBytes / progress.totalBytes}
          detail={`${formatBytes(progress.sentBytes)} of ${formatBytes(progress.totalBytes)}`}
          secondsLeft={progress.secondsLeft}
        />
      )}
      <UnsavedGuard isDirty={progress !== null} />
    </div>
  )
}
