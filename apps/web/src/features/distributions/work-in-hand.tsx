import type { MonthStatus, ServerEvent } from '@fieldfare/contracts'
import { ProgressBar } from '../../components/progress-bar.tsx'

export type RunProgress = Extract<ServerEvent, { kind: 'distribution-progress' }>

/** What a worker is doing for this month, and how far it is. */
export function WorkInHand({ status, progress }: { status: MonthStatus; progress: RunProgress | null }) {
  const isCurrent = progress?.status === status && progress.total > 0
  const what = status === 'issuing' ? 'statements' : 'parts'
  return (
    <div className="max-w-2xl">
      <ProgressBar
        label={status === 'issuing' ? 'Making the statements' : 'Calculating the month'}
        fraction={isCurrent ? progress.done / progress.total : null}
        detail={
          isCurrent
            ? `${progress.done} of ${progress.total} ${what}`
            : 'Waiting for a worker. This page follows by itself.'
        }
      />
    </div>
  )
}
