import { formatIpi, formatIsrc, formatIswc } from '@fieldfare/contracts'
import { formatCount, formatDuration, formatPpm, formatRatio } from '../lib/format.ts'

/** Seconds as m:ss. */
export function Duration({ seconds }: { seconds: number }) {
  return (
    <time dateTime={`PT${Math.max(0, Math.round(seconds))}S`} className="figures">
      {formatDuration(seconds)}
    </time>
  )
}

export function Count({ value }: { value: number }) {
  return <span className="figures">{formatCount(value)}</span>
}

export type PercentProps = ({ ppm: number; ratio?: never } | { ratio: number; ppm?: never }) & {
  decimals?: number
}

/** A part of a whole, from parts per million or from a ratio of 0 to 1. */
export function Percent({ ppm, ratio, decimals }: PercentProps) {
  return (
    <span className="figures">
      {ppm === undefined ? formatRatio(ratio, decimals) : formatPpm(ppm, decimals)}
    </span>
  )
}

const codeFormats = {
  isrc: { label: 'ISRC', format: formatIsrc },
  iswc: { label: 'ISWC', format: formatIswc },
  ipi: { label: 'IPI', format: formatIpi },
} as const

export type CodeProps = { kind: keyof typeof codeFormats; value: string; withLabel?: boolean }

/** An identifier grouped for reading; copying gives it grouped, and every field of ours takes it so. */
export function Code({ kind, value, withLabel = false }: CodeProps) {
  const { label, format } = codeFormats[kind]
  return (
    <span className="figures">
      {withLabel && <span className="mr-1 font-sans text-slate">{label} </span>}
      {format(value)}
    </span>
  )
}
