import type { DisputeView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { DecideForm } from './decide-form.tsx'
import { DisputedPlay } from './disputed-play.tsx'
import { DisputeStatusTag } from './dispute-status-tag.tsx'
import { DisputeThread } from './dispute-thread.tsx'
import { disputeQuery } from './disputes-queries.ts'
import { ReplyForm } from './reply-form.tsx'

export function DisputePage() {
  const { disputeId = '' } = useParams()
  const dispute = useQuery(disputeQuery(disputeId))
  return (
    <QueryState query={dispute} loading="Fetching the dispute">
      {(data) => <DisputeDetails key={data.id} dispute={data} />}
    </QueryState>
  )
}

function DisputeDetails({ dispute }: { dispute: DisputeView }) {
  return (
    <>
      <PageHeader
        title={`Dispute No. ${dispute.number}`}
        breadcrumbs={[{ label: 'Disputes', to: '/disputes' }]}
        aside={<DisputeStatusTag status={dispute.status} />}
        lead={`“${dispute.recording.title}” on ${dispute.station.name}`}
      />
      <Section title="What is disputed">
        <DisputedPlay dispute={dispute} />
      </Section>
      <Section title="What was said">
        <div className="grid gap-6">
          <DisputeThread dispute={dispute} />
          {dispute.canReply && <ReplyForm disputeId={dispute.id} />}
        </div>
      </Section>
      {dispute.canDecide && (
        <Section
          title="Decide"
          lead="A decision is final and goes to the person who opened the dispute by e-mail."
        >
          <DecideForm dispute={dispute} />
        </Section>
      )}
    </>
  )
}
