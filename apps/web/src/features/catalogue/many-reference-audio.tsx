import { uploadReferenceAudio } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { Button } from '../../components/button.tsx'
import { FileField } from '../../components/file-field.tsx'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { UnsavedGuard } from '../../components/unsaved-guard.tsx'
import { describeFailure } from '../../lib/api-problem.ts'
import { formatBytes } from '../../lib/format.ts'
import { uploadFile, type UploadProgress } from '../../lib/upload-file.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { acceptedAudio } from './accepted-audio.ts'

type Sending =
  | { kind: 'waiting' }
  | { kind: 'sending'; progress: UploadProgress }
  | { kind: 'sent'; recordingTitle: string }
  | { kind: 'refused'; reason: string }

type Item = { key: number; file: File; state: Sending }

/** Sends many files one after another, each with its own progress and its own outcome. */
export function ManyReferenceAudio() {
  const queryClient = useQueryClient()
  const [items, setItems] = useState<readonly Item[]>([])
  const [isSending, setIsSending] = useState(false)

  const change = (key: number, state: Sending) =>
    setItems((current) => current.map((item) => (item.key === key ? { ...item, state } : item)))

  const sendOne = async ({ key, file }: Item) => {
    try {
      const audio = await uploadFile(uploadReferenceAudio, {
        fields: {},
        file,
        onProgress: (progress) => change(key, { kind: 'sending', progress }),
      })
      change(key, { kind: 'sent', recordingTitle: audio.recording.title })
      await refreshScopes(queryClient, 'reference-audio')
    } catch (error) {
      change(key, { kind: 'refused', reason: describeFailure(error).detail })
    }
  }
  const send = async (files: readonly File[]) => {
    const first = items.length
    const added = files.map((file, index): Item => ({ key: first + index, file, state: { kind: 'waiting' } }))
    setItems([...items, ...added])
    setIsSending(true)
    // One at a time: the line is the limit, and each progress stays true.
    for (const item of added) await sendOne(item)
    setIsSending(false)
  }

  const done = items.filter(({ state }) => state.kind === 'sent').length
  const refused = items.filter(({ state }) => state.kind === 'refused').length
  return (
    <div className="grid max-w-4xl gap-4">
      <FileField
        label="Files"
        hint="MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC. They are sent at once, one after another."
        accept={acceptedAudio}
        multiple
        files={[]}
        disabled={isSending}
        onFilesChange={(files) => void send(files)}
      />
      {items.length > 0 && (
        <>
          <p aria-live="polite">
            {done} of {items.length} sent{refused > 0 && `, ${refused} refused`}.
          </p>
          <ul className="divide-y divide-hairline border-y border-hairline">
            {items.map((item) => (
              <SendingRow key={item.key} item={item} onRetry={() => void sendOne(item)} />
            ))}
          </ul>
        </>
      )}
      <UnsavedGuard isDirty={isSending} />
    </div>
  )
}

function SendingRow({ item: { file, state }, onRetry }: { item: Item; onRetry: () => void }) {
  return (
    <li className="grid gap-x-6 gap-y-1 py-2 sm:grid-cols-[minmax(0,1fr)_minmax(16rem,auto)]">
      <div className="min-w-0">
        <p className="break-all">{file.name}</p>
        {state.kind === 'refused' && <p className="text-sm font-semibold text-bad">{state.reason}</p>}
        {state.kind === 'sent' && <p className="text-sm text-slate">Goes to “{state.recordingTitle}”.</p>}
      </div>
      <div className="flex flex-wrap items-center gap-3 sm:justify-end">
        <SendingState state={state} size={file.size} />
        {state.kind === 'refused' && <Button onClick={onRetry}>Send again</Button>}
      </div>
    </li>
  )
}

function SendingState({ state, size }: { state: Sending; size: number }) {
  switch (state.kind) {
    case 'waiting':
      return <StatusTag tone="waiting">Waits for its turn</StatusTag>
    case 'sent':
      return <StatusTag tone="good">Sent</StatusTag>
    case 'refused':
      return <StatusTag tone="bad">Refused</StatusTag>
    case 'sending':
      return (
        <ProgressBar
          label="Sending"
          fraction={size === 0 ? null : state.progress.sentBytes / state.progress.totalBytes}
          detail={`${formatBytes(state.progress.sentBytes)} of ${formatBytes(state.progress.totalBytes)}`}
          secondsLeft={state.progress.secondsLeft}
        />
      )
  }
}
