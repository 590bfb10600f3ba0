import type { DistributionView, MonthStatus } from '@fieldfare/contracts'
import { Check, CircleDashed, CircleDot } from 'lucide-react'
import { classNames } from '../../lib/class-names.ts'
import { SocietyTime } from '../../components/society-time.tsx'

const stations = ['open', 'calculated', 'approved', 'issued'] as const
type Stage = (typeof stations)[number]

const words = { open: 'Open', calculated: 'Calculated', approved: 'Approved', issued: 'Issued' } as const

/** How many of the four stages are behind the month. */
const reachedBy = {
  open: 0,
  calculating: 0,
  calculated: 1,
  approved: 2,
  issuing: 2,
  issued: 3,
} as const satisfies Record<MonthStatus, number>

type Happening = { who: string | null; at: string | null }

function happeningOf(view: DistributionView, stage: Stage): Happening {
  switch (stage) {
    case 'open':
      return { who: null, at: null }
    case 'calculated':
      return { who: view.calculatedByName, at: view.calculatedAt }
    case 'approved':
      return { who: view.approvedByName, at: view.approvedAt }
    case 'issued':
      return { who: null, at: view.issuedAt }
  }
}

/** The way of a month as one line, with who took each step and when. */
export function MonthLine({ view }: { view: DistributionView }) {
  const reached = reachedBy[view.status]
  return (
    <ol aria-label="Steps of the month" className="grid gap-y-3 sm:grid-cols-4">
      {stations.map((stage, index) => (
        <li
          key={stage}
          aria-current={index === reached ? 'step' : undefined}
          className={classNames(
            'border-t-3 pt-2 pr-4',
            index <= reached ? 'border-chestnut' : 'border-hairline',
          )}
        >
          <p
            className={classNames(
              'flex items-center gap-1.5',
              index <= reached ? 'font-semibold' : 'text-slate',
            )}
          >
            <StageIcon isDone={index < reached || view.status === 'issued'} isHere={index === reached} />
            {words[stage]}
          </p>
          <StageDetail
            happening={index <= reached ? happeningOf(view, stage) : { who: null, at: null }}
            note={noteFor(view.status, stage)}
          />
        </li>
      ))}
    </ol>
  )
}

function StageIcon({ isDone, isHere }: { isDone: boolean; isHere: boolean }) {
  const Icon = isDone ? Check : isHere ? CircleDot : CircleDashed
  return <Icon aria-hidden className="size-4 shrink-0 text-chestnut" />
}

function noteFor(status: MonthStatus, stage: Stage): string | null {
  if (stage === 'open' && status === 'open') return 'Plays and shares can still change.'
  if (stage === 'calculated' && status === 'calculating') return 'Being calculated now'
  if (stage === 'issued' && status === 'issuing') return 'Statements being made now'
  return null
}

function StageDetail({ happening: { who, at }, note }: { happening: Happening; note: string | null }) {
  return (
    <p className="text-sm text-slate">
      {who !== null && <span className="block">{who}</span>}
      {at !== null && <SocietyTime instant={at} precision="minute" />}
      {note}
    </p>
  )
}
