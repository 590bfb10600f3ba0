import { monthStatusLabels, type MonthStatus } from '@fieldfare/contracts'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'

const tones = {
  open: 'waiting',
  calculating: 'calm',
  calculated: 'calm',
  approved: 'good',
  issuing: 'calm',
  issued: 'good',
} as const satisfies Record<MonthStatus, StatusTone>

/** How far a month is. */
export function MonthStatusTag({ status }: { status: MonthStatus }) {
  return <StatusTag tone={tones[status]}>{monthStatusLabels[status]}</StatusTag>
}
