import { FileAudio, RotateCw, X } from 'lucide-react'
import { Button, IconButton } from '../../components/button.tsx'
import { ChoiceGroup, RadioField } from '../../components/choice-field.tsx'
import { Notice } from '../../components/notice.tsx'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { DateTimeField } from '../../components/text-field.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatBytes } from '../../lib/format.ts'
import type { EntryChange, UploadEntry, UploadRefusal } from './upload-entries.ts'

type UploadRowProps = {
  entry: UploadEntry
  timeZone: string | undefined
  isBusy: boolean
  onChange: (change: EntryChange) => void
  onRemove: () => void
  onRetry: () => void
}

/** One file to send: its start, how far it is, what is wrong with it. */
export function UploadRow(props: UploadRowProps) {
  const { entry, isBusy, onRemove } = props
  const { file, state } = entry
  return (
    <li className="grid gap-3 py-4">
      <div className="flex items-start gap-3">
        <FileAudio aria-hidden className="mt-1 size-4 shrink-0 text-slate" />
        <p className="min-w-0 grow">
          <span className="font-semibold break-all">{file.name}</span>{' '}
          <span className="figures text-slate">{formatBytes(file.size)}</span>
        </p>
        {state.kind !== 'sending' && (
          <IconButton
            icon={X}
            label={`Take ${file.name} off the list`}
            disabled={isBusy}
            onClick={onRemove}
          />
        )}
      </div>
      <div className="grid gap-3 sm:pl-7">
        <UploadRowBody {...props} />
      </div>
    </li>
  )
}

function UploadRowBody(props: UploadRowProps) {
  const { state } = props.entry
  switch (state.kind) {
    case 'sent':
      return (
        <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
          <StatusTag tone="good">Arrived</StatusTag>
          <TextLink to={`/logs/${state.log.id}`}>Follow its analysis</TextLink>
        </div>
      )
    case 'sending':
      return <SendingProgress progress={state.progress} sizeBytes={props.entry.file.size} />
    case 'ready':
      return <StartFields {...props} refusal={{}} />
    case 'refused':
      return (
        <>
          <StartFields {...props} refusal={state.refusal} />
          {state.refusal.file !== undefined && (
            <Notice
              tone="bad"
              announce
              title={state.refusal.file.title}
              actions={
                <Button icon={RotateCw} disabled={props.isBusy} onClick={props.onRetry}>
                  Send this file again
                </Button>
              }
            >
              {state.refusal.file.detail}
            </Notice>
          )}
        </>
      )
  }
}

function SendingProgress({
  progress,
  sizeBytes,
}: {
  progress: { sentBytes: number; totalBytes: number; secondsLeft: number | null } | null
  sizeBytes: number
}) {
  const isSent = progress !== null && progress.totalBytes > 0 && progress.sentBytes >= progress.totalBytes
  if (isSent) return <ProgressBar label="Checking what arrived" fraction={null} />
  return (
    <ProgressBar
      label="Sending"
      fraction={progress === null || progress.totalBytes === 0 ? 0 : progress.sentBytes / progress.totalBytes}
      detail={`${formatBytes(progress?.sentBytes ?? 0)} of ${formatBytes(progress?.totalBytes ?? sizeBytes)}`}
      secondsLeft={progress?.secondsLeft ?? null}
    />
  )
}

function StartFields({
  entry,
  timeZone,
  isBusy,
  onChange,
  refusal,
}: UploadRowProps & { refusal: UploadRefusal }) {
  const { key, startedAtLocal, isSuggested, asksOccurrence, occurrence } = entry
  return (
    <>
      <DateTimeField
        label="Recording begins"
        hint={
          isSuggested
            ? 'Read from the file name. Check that this is what the station’s clock showed.'
            : 'As the station’s clock showed it.'
        }
        error={refusal.startedAtLocal}
        step={1}
        value={startedAtLocal}
        disabled={isBusy}
        {...(timeZone === undefined ? {} : { timeZone })}
        onChange={(event) =>
          onChange({
            startedAtLocal: event.currentTarget.value,
            isSuggested: false,
            asksOccurrence: false,
            occurrence: '',
            state: { kind: 'ready' },
          })
        }
      />
      {asksOccurrence && (
        <ChoiceGroup
          legend="The clocks went back and this time happened twice. Which was it?"
          error={occurrence === '' ? refusal.occurrence : undefined}
        >
          <RadioField
            name={`occurrence ${key}`}
            label="The earlier, before the clocks went back"
            disabled={isBusy}
            checked={occurrence === 'earlier'}
            onChange={() => onChange({ occurrence: 'earlier' })}
          />
          <RadioField
            name={`occurrence ${key}`}
            label="The later, after the clocks went back"
            disabled={isBusy}
            checked={occurrence === 'later'}
            onChange={() => onChange({ occurrence: 'later' })}
          />
        </ChoiceGroup>
      )}
    </>
  )
}
