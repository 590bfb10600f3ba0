import { disputeStatusLabels, disputeStatusSchema, type DetectionDetail } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { ArrowLeft, ArrowRight } from 'lucide-react'
import { useNavigate, useParams } from 'react-router'
import { z } from 'zod'
import { LinkButton } from '../../components/button.tsx'
import { CheckboxField } from '../../components/choice-field.tsx'
import { ReviewStateTag } from '../../components/detection-marks.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useRole } from '../../lib/session.ts'
import { useStoredValue } from '../../lib/stored-value.ts'
import { AlignmentPlot } from './alignment-plot.tsx'
import { ClipPlayers } from './clip-players.tsx'
import { DetectionDecision } from './detection-decision.tsx'
import { DetectionFacts } from './detection-facts.tsx'
import { DetectionHistory } from './detection-history.tsx'
import { detectionQuery } from './detections-queries.ts'
import { useNeighbours, type Neighbours } from './use-neighbours.ts'
import { useReviewKeys } from './use-review-keys.ts'

const keysSchema = z.boolean()

export function DetectionPage() {
  const { detectionId = '' } = useParams()
  const detection = useQuery(detectionQuery(detectionId))
  const neighbours = useNeighbours(detectionId)
  const [areKeysOn, setAreKeysOn] = useStoredValue('detection-keys', keysSchema, true)
  const navigate = useNavigate()
  const go = (address: string | null) => {
    if (address !== null) void navigate(address)
  }
  useReviewKeys(areKeysOn, { n: () => go(neighbours.next), p: () => go(neighbours.previous) })
  return (
    <QueryState query={detection} loading="Fetching the detection">
      {(detail) => (
        <>
          <DetectionHeader detection={detail} neighbours={neighbours} />
          <DetectionView detection={detail} areKeysOn={areKeysOn} />
          <KeysChoice areKeysOn={areKeysOn} onChange={setAreKeysOn} />
        </>
      )}
    </QueryState>
  )
}

function DetectionHeader({ detection, neighbours }: { detection: DetectionDetail; neighbours: Neighbours }) {
  const { recording, station, startedAt, reviewState } = detection
  return (
    <PageHeader
      title={recording.title}
      breadcrumbs={[{ label: 'Detections', to: neighbours.list }]}
      aside={<ReviewStateTag state={reviewState} />}
      lead={
        <>
          By {recording.artist}, heard on {station.name},{' '}
          <StationTime instant={startedAt} timeZone={station.timeZone} precision="second" />
          {neighbours.place !== null && <span className="block text-sm">{neighbours.place}</span>}
        </>
      }
      actions={
        neighbours.place !== null && (
          <>
            {neighbours.previous !== null && (
              <LinkButton to={neighbours.previous} icon={ArrowLeft}>
                Previous
              </LinkButton>
            )}
            {neighbours.next !== null && (
              <LinkButton to={neighbours.next} icon={ArrowRight}>
                Next
              </LinkButton>
            )}
          </>
        )
      }
    />
  )
}

function DetectionView({ detection, areKeysOn }: { detection: DetectionDetail; areKeysOn: boolean }) {
  return (
    <div className="grid min-w-0 gap-x-12 lg:grid-cols-[minmax(0,3fr)_minmax(23rem,2fr)]">
      <div className="min-w-0">
        <Section title="Listen">
          <ClipPlayers key={detection.id} detection={detection} />
        </Section>
        <DetectionDecision detection={detection} areKeysOn={areKeysOn} />
        <Section title="Alignment">
          <AlignmentPlot detection={detection} />
        </Section>
      </div>
      <div className="min-w-0 max-lg:mt-10">
        <Section title="What was found">
          <DetectionFacts detection={detection} />
        </Section>
        <DisputesOfDetection detection={detection} />
        <Section title="History">
          <DetectionHistory detection={detection} />
        </Section>
      </div>
    </div>
  )
}

function statusWord(status: string): string {
  const reading = disputeStatusSchema.safeParse(status)
  return reading.success ? disputeStatusLabels[reading.data] : status
}

function DisputesOfDetection({ detection }: { detection: DetectionDetail }) {
  const role = useRole()
  if (detection.disputes.length === 0 || role === 'uploader') return null
  return (
    <Section title="Disputes">
      <ul className="divide-y divide-hairline border-y border-hairline">
        {detection.disputes.map((dispute) => (
          <li key={dispute.id} className="flex flex-wrap justify-between gap-x-4 py-2">
            <TextLink to={`/disputes/${dispute.id}`}>
              Opened <StationTime instant={dispute.openedAt} timeZone={detection.station.timeZone} />
            </TextLink>
            <span>{statusWord(dispute.status)}</span>
          </li>
        ))}
      </ul>
    </Section>
  )
}

function KeysChoice({ areKeysOn, onChange }: { areKeysOn: boolean; onChange: (areKeysOn: boolean) => void }) {
  const role = useRole()
  return (
    <div className="no-print mt-10 border-t border-hairline pt-3">
      <CheckboxField
        label="Use single keys on this page"
        hint={`${role === 'clerk' ? 'C confirms, R goes to the reason for a rejection, ' : ''}N and P go to the next and the previous detection of the list.`}
        checked={areKeysOn}
        onChange={(event) => onChange(event.currentTarget.checked)}
      />
    </div>
  )
}
