import type { DetectionDetail } from '@fieldfare/contracts'
import { Scale } from 'lucide-react'
import { useState } from 'react'
import { Button } from '../../components/button.tsx'
import { Notice } from '../../components/notice.tsx'
import { OpenDisputeForm } from '../../components/open-dispute-form.tsx'
import { Section } from '../../components/page-header.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useRole } from '../../lib/session.ts'
import { ReviewForm } from './review-form.tsx'

/** What this person may do about the detection: review it, dispute it, or read why not. */
export function DetectionDecision({
  detection,
  areKeysOn,
}: {
  detection: DetectionDetail
  areKeysOn: boolean
}) {
  const role = useRole()
  if (role === 'clerk') {
    return (
      <Section title="Your decision">
        {detection.canReview ? (
          <ReviewForm key={detection.id} detection={detection} areKeysOn={areKeysOn} />
        ) : (
          <Notice title={detection.isMonthOpen ? 'Nothing to decide here' : 'Its month is closed'}>
            {detection.isMonthOpen
              ? 'This detection cannot be reviewed.'
              : 'What was calculated for the month rests on this detection as it stands. Open the month again to change it, or correct it in a later one.'}
          </Notice>
        )}
      </Section>
    )
  }
  if (role === 'auditor') return <AuditorDispute key={detection.id} detection={detection} />
  return null
}

function AuditorDispute({ detection }: { detection: DetectionDetail }) {
  const [isOpen, setIsOpen] = useState(false)
  const { play, openDisputeId, canDispute } = detection
  if (openDisputeId !== null) {
    return (
      <Section title="Dispute">
        <p>
          Its play is in dispute: <TextLink to={`/disputes/${openDisputeId}`}>go to the dispute</TextLink>.
        </p>
      </Section>
    )
  }
  if (play === null || !canDispute) return null
  return (
    <Section title="Dispute">
      {isOpen ? (
        <OpenDisputeForm playId={play.id} onCancel={() => setIsOpen(false)} />
      ) : (
        <Button tone="main" icon={Scale} onClick={() => setIsOpen(true)}>
          Dispute this play
        </Button>
      )}
    </Section>
  )
}
