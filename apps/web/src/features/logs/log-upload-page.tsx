import type { StationView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Send } from 'lucide-react'
import { useState, type ReactNode } from 'react'
import { useSearchParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { SelectField } from '../../components/choice-field.tsx'
import { FileField } from '../../components/file-field.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { UnsavedGuard } from '../../components/unsaved-guard.tsx'
import { stationsQuery } from '../../lib/reference-queries.ts'
import { isUnsent, type UploadEntry } from './upload-entries.ts'
import { UploadRow } from './upload-row.tsx'
import { useLogUploads } from './use-log-uploads.ts'

const ACCEPTED = '.mp3,.wav,.flac,.ogg,.oga,.opus,.m4a,.mp4,.aac'

export function LogUploadPage() {
  const stations = useQuery(stationsQuery())
  return (
    <>
      <PageHeader
        title="Send station logs"
        lead="Recordings of what was broadcast. Each is analysed as soon as it has arrived; you can follow that on its page."
        breadcrumbs={[{ label: 'Station logs', to: '/logs' }]}
      />
      <QueryState query={stations} loading="Fetching your stations">
        {({ items }) => <UploadForm stations={items.filter((station) => station.canUpload)} />}
      </QueryState>
    </>
  )
}

function countOf(entries: readonly UploadEntry[]): string {
  return entries.length === 1 ? '1 file' : `${entries.length} files`
}

function UploadForm({ stations }: { stations: readonly StationView[] }) {
  const [search] = useSearchParams()
  const onlyStation = stations.length === 1 ? stations[0] : undefined
  const [stationId, setStationId] = useState<string>(search.get('stationId') ?? onlyStation?.id ?? '')
  const [stationError, setStationError] = useState<string>()
  const uploads = useLogUploads()
  const station = stations.find((candidate) => candidate.id === stationId)
  const unsent = uploads.entries.filter(isUnsent)

  const send = (entries: readonly UploadEntry[]) => {
    if (station === undefined) setStationError('Choose the station that broadcast these recordings.')
    else void uploads.send(station, entries)
  }
  if (stations.length === 0) {
    return (
      <EmptyState
        title="No station you could send logs for"
        action={<LinkButton to="/logs">See the station logs</LinkButton>}
      >
        An administrator assigns stations to people. Ask for yours to be assigned to you.
      </EmptyState>
    )
  }
  return (
    <div className="grid max-w-3xl gap-6">
      <SelectField
        label="Station"
        emptyLabel="Choose a station"
        error={stationError}
        value={stationId}
        disabled={uploads.isSending}
        choices={stations.map(({ id, name }) => ({ value: id, label: name }))}
        onChange={(event) => {
          setStationId(event.currentTarget.value)
          setStationError(undefined)
          uploads.dispatch({ kind: 'station-changed' })
        }}
      />
      <FileField
        label="Recordings"
        hint="MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC; several at once if you like."
        accept={ACCEPTED}
        multiple
        files={[]}
        disabled={uploads.isSending}
        onFilesChange={(files) => uploads.dispatch({ kind: 'add', files })}
      />
      <UploadList uploads={uploads} timeZone={station?.timeZone} onSend={send} />
      {uploads.entries.length > 0 && (
        <SendBar entries={uploads.entries} isSending={uploads.isSending} onSend={() => send(unsent)} />
      )}
      <LeaveGuard isSending={uploads.isSending} unsent={unsent.length} />
    </div>
  )
}

function UploadList({
  uploads,
  timeZone,
  onSend,
}: {
  uploads: ReturnType<typeof useLogUploads>
  timeZone: string | undefined
  onSend: (entries: readonly UploadEntry[]) => void
}) {
  if (uploads.entries.length === 0) return null
  return (
    <ul aria-label="Files to send" className="divide-y divide-hairline border-y border-ink">
      {uploads.entries.map((entry) => (
        <UploadRow
          key={entry.key}
          entry={entry}
          timeZone={timeZone}
          isBusy={uploads.isSending}
          onChange={(change) => uploads.dispatch({ kind: 'change', key: entry.key, change })}
          onRemove={() => uploads.dispatch({ kind: 'remove', key: entry.key })}
          onRetry={() => onSend([entry])}
        />
      ))}
    </ul>
  )
}

function SendBar({
  entries,
  isSending,
  onSend,
}: {
  entries: readonly UploadEntry[]
  isSending: boolean
  onSend: () => void
}) {
  const unsent = entries.filter(isUnsent)
  const arrived = entries.filter((entry) => entry.state.kind === 'sent').length
  let action: ReactNode = (
    <LinkButton to="/logs" tone="main">
      See the station logs
    </LinkButton>
  )
  if (isSending || unsent.length > 0) {
    action = (
      <Button tone="main" icon={Send} busy={isSending} onClick={onSend}>
        {isSending ? 'Sending' : `Send ${countOf(unsent)}`}
      </Button>
    )
  }
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
      {action}
      <p role="status" className="text-slate">
        {arrived > 0 && `${arrived} of ${countOf(entries)} arrived.`}
      </p>
    </div>
  )
}

function LeaveGuard({ isSending, unsent }: { isSending: boolean; unsent: number }) {
  return (
    <UnsavedGuard
      isDirty={isSending || unsent > 0}
      title={isSending ? 'Leave while files are being sent?' : 'Leave without sending?'}
      confirmLabel={isSending ? 'Leave and stop sending' : 'Leave without sending'}
    >
      <p>
        {isSending
          ? 'The file being sent is broken off and has to be sent again. Those that have arrived are kept.'
          : 'The files you chose have not been sent.'}
      </p>
    </UnsavedGuard>
  )
}
