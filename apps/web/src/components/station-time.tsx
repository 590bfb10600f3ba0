import { formatClock, formatInstant, formatZone } from '../lib/format-time.ts'

export type StationTimeProps = {
  instant: string
  timeZone: string
  precision?: 'day' | 'minute' | 'second'
  /** Only the clock, where the date stands beside or above already. */
  clockOnly?: boolean
  /** Shows the zone's short name; leave out in columns whose head names the zone. */
  withZone?: boolean
  /** UTC in the text as well, for single facts on detail pages; otherwise on hover. */
  withUtc?: boolean
}

function utcText(instant: string): string {
  return `${new Date(instant).toISOString().slice(0, 19).replace('T', ' ')} UTC`
}

/** A moment as the station's clock showed it, with the zone, and UTC on hover or beside it. */
export function StationTime({
  instant,
  timeZone,
  precision = 'minute',
  clockOnly = false,
  withZone = true,
  withUtc = false,
}: StationTimeProps) {
  const text = clockOnly
    ? formatClock(instant, timeZone, precision === 'second' ? 'second' : 'minute')
    : formatInstant(instant, timeZone, precision)
  return (
    <time dateTime={instant} title={`${utcText(instant)} · ${timeZone}`} className="figures">
      {text}
      {withZone && precision !== 'day' && (
        <span className="text-slate"> {formatZone(instant, timeZone)}</span>
      )}
      {withUtc && <span className="block text-slate">{utcText(instant)}</span>}
    </time>
  )
}
