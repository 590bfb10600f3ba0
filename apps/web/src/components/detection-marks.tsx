import { reviewStateLabels, type ReviewState } from '@fieldfare/contracts'
import { StatusTag, type StatusTone } from './status-tag.tsx'

const tones = {
  accepted: 'good',
  waiting: 'warn',
  confirmed: 'good',
  rejected: 'bad',
} as const satisfies Record<ReviewState, StatusTone>

export function ReviewStateTag({ state }: { state: ReviewState }) {
  return <StatusTag tone={tones[state]}>{reviewStateLabels[state]}</StatusTag>
}

/** How sure the engine is, short: one false alarm in 10 to the n hours of log. */
export function Confidence({ confidence }: { confidence: number }) {
  const power = Math.floor(confidence)
  return (
    <span className="figures">
      1 in 10<sup>{String(power).replace('-', '\u2212')}</sup> h
    </span>
  )
}
