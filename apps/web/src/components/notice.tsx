import { CircleAlert, CircleCheck, Info, TriangleAlert, type LucideIcon } from 'lucide-react'
import type { ReactNode } from 'react'
import { classNames } from '../lib/class-names.ts'

export type NoticeTone = 'calm' | 'good' | 'warn' | 'bad'

export const noticeLook = {
  calm: { icon: Info, ink: 'text-calm', ground: 'bg-calm-ground', edge: 'border-calm' },
  good: { icon: CircleCheck, ink: 'text-good', ground: 'bg-good-ground', edge: 'border-good' },
  warn: { icon: TriangleAlert, ink: 'text-warn', ground: 'bg-warn-ground', edge: 'border-warn' },
  bad: { icon: CircleAlert, ink: 'text-bad', ground: 'bg-bad-ground', edge: 'border-bad' },
} as const satisfies Record<NoticeTone, { icon: LucideIcon; ink: string; ground: string; edge: string }>

export type NoticeProps = {
  tone?: NoticeTone
  title: ReactNode
  children?: ReactNode
  actions?: ReactNode
  /** Read out at once, for what answers something the person just did. */
  announce?: boolean
}

/** A message that stays in the page beside what it is about. */
export function Notice({ tone = 'calm', title, children, actions, announce = false }: NoticeProps) {
  const { icon: Icon, ink, ground, edge } = noticeLook[tone]
  return (
    <div
      role={announce ? 'alert' : undefined}
      className={classNames('flex gap-3 border-l-4 px-4 py-3', ground, edge)}
    >
      <Icon aria-hidden className={classNames('mt-0.5 size-5 shrink-0', ink)} />
      <div className="grid min-w-0 grow gap-1">
        <p className={classNames('font-semibold', ink)}>{title}</p>
        {children !== undefined && <div className="text-ink">{children}</div>}
        {actions !== undefined && <div className="mt-1 flex flex-wrap gap-2">{actions}</div>}
      </div>
    </div>
  )
}
