import type { UserView } from '@fieldfare/contracts'
import { Ban, CircleCheck, Mail, type LucideIcon } from 'lucide-react'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'

const looks = {
  invited: { tone: 'waiting', icon: Mail, word: 'Invited' },
  active: { tone: 'good', icon: CircleCheck, word: 'Active' },
  disabled: { tone: 'bad', icon: Ban, word: 'Disabled' },
} as const satisfies Record<UserView['status'], { tone: StatusTone; icon: LucideIcon; word: string }>

/** Whether a person can sign in. */
export function UserStatusTag({ status }: { status: UserView['status'] }) {
  const { tone, icon, word } = looks[status]
  return (
    <StatusTag tone={tone} icon={icon}>
      {word}
    </StatusTag>
  )
}
