import { disputeStatusLabels, type DisputeStatus } from '@fieldfare/contracts'
import { CircleCheck, CircleX, MessagesSquare, type LucideIcon } from 'lucide-react'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'

const looks = {
  open: { tone: 'warn', icon: MessagesSquare },
  upheld: { tone: 'good', icon: CircleCheck },
  dismissed: { tone: 'calm', icon: CircleX },
} as const satisfies Record<DisputeStatus, { tone: StatusTone; icon: LucideIcon }>

/** Where a dispute stands. */
export function DisputeStatusTag({ status }: { status: DisputeStatus }) {
  const { tone, icon } = looks[status]
  return (
    <StatusTag tone={tone} icon={icon}>
      {disputeStatusLabels[status]}
    </StatusTag>
  )
}
