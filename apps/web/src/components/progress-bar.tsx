import { formatRatio, formatRemaining } from '../lib/format.ts'

export type ProgressBarProps = {
  /** What is being done: "Matching against the catalogue". */
  label: string
  /** 0 to 1; null while the length is not known yet. */
  fraction: number | null
  /** How far in the work's own units: "1:12:30 of 3:00:00". */
  detail?: string
  secondsLeft?: number | null
}

/** What is being done, how far it is, how long it still takes. */
export function ProgressBar({ label, fraction, detail, secondsLeft }: ProgressBarProps) {
  const share = fraction === null ? null : Math.min(1, Math.max(0, fraction))
  return (
    <div className="grid min-w-40 gap-1">
      <div className="flex flex-wrap justify-between gap-x-4 text-sm">
        <span className="font-semibold">{label}</span>
        {share !== null && <span className="figures">{formatRatio(share, 0)}</span>}
      </div>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        {...(share === null ? {} : { 'aria-valuenow': Math.round(share * 100) })}
        className="h-2 overflow-hidden border border-edge bg-sheet"
      >
        <div
          className={share === null ? 'h-full w-1/4 animate-pulse bg-slate' : 'h-full bg-chestnut'}
          style={share === null ? undefined : { width: `${share * 100}%` }}
        />
      </div>
      {(detail !== undefined || typeof secondsLeft === 'number') && (
        <div className="flex flex-wrap justify-between gap-x-4 text-sm text-slate">
          <span>{detail}</span>
          {typeof secondsLeft === 'number' && <span>about {formatRemaining(secondsLeft)} left</span>}
        </div>
      )}
    </div>
  )
}
