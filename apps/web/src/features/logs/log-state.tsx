import { logStatusLabels, type LogProgress, type LogStatus, type StationLogView } from '@fieldfare/contracts'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'
import { formatHours } from '../../lib/format.ts'

const tones = {
  queued: 'waiting',
  analysing: 'calm',
  analysed: 'good',
  rejected: 'bad',
  failed: 'bad',
} as const satisfies Record<LogStatus, StatusTone>

const stageLabels = {
  checking: 'Checking the recording',
  matching: 'Listening for recordings',
  writing: 'Writing down what was found',
} as const satisfies Record<LogProgress['stage'], string>

export function LogStatusTag({ status }: { status: LogStatus }) {
  return <StatusTag tone={tones[status]}>{logStatusLabels[status]}</StatusTag>
}

/** How far an analysis is, in the log's own hours. */
export function LogProgressBar({ progress }: { progress: LogProgress }) {
  const { stage, doneSeconds, totalSeconds, secondsLeft } = progress
  const isMeasured = totalSeconds !== null && totalSeconds > 0
  return (
    <ProgressBar
      label={stageLabels[stage]}
      fraction={isMeasured ? doneSeconds / totalSeconds : null}
      detail={
        isMeasured
          ? `${formatHours(doneSeconds)} of ${formatHours(totalSeconds)}`
          : `${formatHours(doneSeconds)} so far`
      }
      secondsLeft={secondsLeft}
    />
  )
}

/** The state of a log in a row: a word, its progress while under way, the reason where it was refused. */
export function LogState({ log }: { log: StationLogView }) {
  return (
    <div className="grid max-w-80 gap-1">
      {log.progress !== null && log.status === 'analysing' ? (
        <LogProgressBar progress={log.progress} />
      ) : (
        <LogStatusTag status={log.status} />
      )}
      {log.failure !== null && <p className="text-sm">{log.failure.message}</p>}
      {log.failure === null && log.warnings.length > 0 && (
        <StatusTag tone="warn">
          {log.warnings.length === 1 ? '1 warning' : `${log.warnings.length} warnings`}
        </StatusTag>
      )}
    </div>
  )
}
