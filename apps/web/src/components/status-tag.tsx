import {
  CircleAlert,
  CircleCheck,
  CircleDashed,
  CircleDot,
  TriangleAlert,
  type LucideIcon,
} from 'lucide-react'
import type { ReactNode } from 'react'
import { classNames } from '../lib/class-names.ts'

export type StatusTone = 'good' | 'warn' | 'bad' | 'calm' | 'waiting'

const looks = {
  good: { icon: CircleCheck, ink: 'text-good' },
  warn: { icon: TriangleAlert, ink: 'text-warn' },
  bad: { icon: CircleAlert, ink: 'text-bad' },
  calm: { icon: CircleDot, ink: 'text-calm' },
  waiting: { icon: CircleDashed, ink: 'text-slate' },
} as const satisfies Record<StatusTone, { icon: LucideIcon; ink: string }>

export type StatusTagProps = { tone: StatusTone; icon?: LucideIcon; children: ReactNode }

/** A status in a word with a shape; the colour only helps. */
export function StatusTag({ tone, icon, children }: StatusTagProps) {
  const look = looks[tone]
  const Icon = icon ?? look.icon
  return (
    <span
      className={classNames('inline-flex items-center gap-1.5 font-semibold whitespace-nowrap', look.ink)}
    >
      <Icon aria-hidden className="size-4 shrink-0" />
      {children}
    </span>
  )
}
