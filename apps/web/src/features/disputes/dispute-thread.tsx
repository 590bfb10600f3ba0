import { disputeStatusLabels, roleLabels, type DisputeView, type Role } from '@fieldfare/contracts'
import type { ReactNode } from 'react'
import { SocietyTime } from '../../components/society-time.tsx'

/** Reason, messages and decision, in the order of time. */
export function DisputeThread({ dispute }: { dispute: DisputeView }) {
  return (
    <ol className="max-w-[72ch] divide-y divide-hairline border-b border-hairline">
      <Saying
        who={dispute.openedByName}
        authorRole={dispute.openedByRole}
        what="opened the dispute"
        at={dispute.openedAt}
      >
        {dispute.reason}
      </Saying>
      {dispute.messages.map((message) => (
        <Saying
          key={message.id}
          who={message.authorName}
          authorRole={message.authorRole}
          what="wrote"
          at={message.at}
        >
          {message.text}
        </Saying>
      ))}
      {dispute.decidedAt !== null && (
        <Saying
          who={dispute.decidedByName ?? 'The society'}
          authorRole="clerk"
          what={`decided: ${disputeStatusLabels[dispute.status].toLowerCase()}`}
          at={dispute.decidedAt}
        >
          {dispute.decisionReason}
        </Saying>
      )}
    </ol>
  )
}

type SayingProps = { who: string; authorRole: Role; what: string; at: string; children: ReactNode }

function Saying({ who, authorRole, what, at, children }: SayingProps) {
  return (
    <li className="py-4">
      <p className="flex flex-wrap items-baseline justify-between gap-x-4 text-sm text-slate">
        <span>
          <span className="font-semibold text-ink">{who}</span>, {roleLabels[authorRole].toLowerCase()},{' '}
          {what}
        </span>
        <SocietyTime instant={at} precision="minute" />
      </p>
      <p className="mt-1 break-words whitespace-pre-line">{children}</p>
    </li>
  )
}
