import { listDisputes, type MonthOverview } from '@fieldfare/contracts'
import type { ReactNode } from 'react'
import { KeyFigures, type KeyFigure } from '../../components/definition-list.tsx'
import { Count, Percent } from '../../components/figures.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'
import { useRole } from '../../lib/session.ts'
import { identifiedShare } from './airtime.ts'

function figure(label: string, to: string, value: ReactNode, detail?: ReactNode): KeyFigure {
  return { label, value: <TextLink to={to}>{value}</TextLink>, detail }
}

/** The month in a row of figures, each leading to the list behind it. */
export function MonthFigures({ overview }: { overview: MonthOverview }) {
  const role = useRole()
  const { month, totals } = overview
  const share = identifiedShare(totals)
  const held = totals.expectedSeconds === 0 ? null : totals.heldSeconds / totals.expectedSeconds
  const maySeeDisputes = listDisputes.access.some((reader) => reader === role)
  return (
    <KeyFigures
      items={[
        figure('Plays', `/plays?month=${month}`, <Count value={totals.plays} />),
        figure(
          'Airtime held',
          `/logs?month=${month}`,
          <span className="figures">{formatHours(totals.heldSeconds)}</span>,
          held === null ? undefined : (
            <>
              <Percent ratio={held} /> of {formatHours(totals.expectedSeconds)} expected
            </>
          ),
        ),
        figure(
          'Music identified',
          `/detections?month=${month}`,
          share === null ? 'No music' : <Percent ratio={share} />,
          <>
            {formatHours(totals.identifiedSeconds)} of {formatHours(totals.musicSeconds)}
          </>,
        ),
        figure(
          'Waiting for review',
          `/detections?month=${month}&state=waiting`,
          <Count value={totals.waitingForReview} />,
        ),
        ...(maySeeDisputes
          ? [
              figure(
                'Open disputes',
                `/disputes?month=${month}&status=open`,
                <Count value={totals.openDisputes} />,
              ),
            ]
          : []),
        figure(
          'Logs in work',
          `/logs?month=${month}&status=analysing`,
          <Count value={totals.logsInWork} />,
          totals.logsRefused > 0 && (
            <TextLink to={`/logs?month=${month}&status=rejected`}>
              <Count value={totals.logsRefused} /> refused or failed
            </TextLink>
          ),
        ),
      ]}
    />
  )
}
