import { getDistribution, monthSchema, monthStatusLabels, type MonthOverview } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router'
import { LinkButton } from '../../components/button.tsx'
import { MonthStepper } from '../../components/month-stepper.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { currentMonth, formatMonth } from '../../lib/format-time.ts'
import { monthsQuery } from '../../lib/reference-queries.ts'
import { useRole, useSession } from '../../lib/session.ts'
import { AirtimeCharts } from './airtime-charts.tsx'
import { MonthFigures } from './month-figures.tsx'
import { StationCharts } from './station-charts.tsx'
import { StationCounts } from './station-counts.tsx'
import { TopRecordings } from './top-recordings.tsx'
import { overviewQuery } from './overview-queries.ts'

export function OverviewPage() {
  const [search] = useSearchParams()
  const asked = monthSchema.safeParse(search.get('month'))
  const months = useQuery(monthsQuery())
  if (asked.success) return <MonthView month={asked.data} latestHeld={months.data?.current} />
  return (
    <QueryState query={months} loading="Finding the month the desk works on">
      {({ current }) => <MonthView month={current} latestHeld={current} />}
    </QueryState>
  )
}

function MonthView({ month, latestHeld }: { month: string; latestHeld: string | undefined }) {
  const { society } = useSession()
  const [, setSearch] = useSearchParams()
  const overview = useQuery(overviewQuery(month))
  const showMonth = (next: string) => setSearch({ month: next }, { preventScrollReset: true })
  const shown = overview.data?.month === month ? overview.data : undefined
  return (
    <>
      <PageHeader
        title={formatMonth(month)}
        lead="What is held of the month, what was found in it, and what still waits for someone."
        aside={shown !== undefined && <MonthState overview={shown} />}
        actions={<MonthStepper month={month} onChange={showMonth} latest={currentMonth(society.timeZone)} />}
      />
      <QueryState query={overview} loading={`Adding up ${formatMonth(month)}`}>
        {(data) =>
          isEmpty(data) ? (
            <EmptyMonth month={month} latestHeld={latestHeld} />
          ) : (
            <div className={shown === undefined ? 'opacity-60' : undefined} aria-busy={shown === undefined}>
              <MonthBody overview={data} />
            </div>
          )
        }
      </QueryState>
    </>
  )
}

function isEmpty({ totals }: MonthOverview): boolean {
  const { heldSeconds, plays, logsInWork, logsRefused } = totals
  return heldSeconds === 0 && plays === 0 && logsInWork === 0 && logsRefused === 0
}

function MonthState({ overview }: { overview: MonthOverview }) {
  const role = useRole()
  const word = (
    <StatusTag tone={overview.status === 'issued' ? 'good' : 'calm'}>
      {monthStatusLabels[overview.status]}
    </StatusTag>
  )
  const isLinked = getDistribution.access.some((reader) => reader === role)
  return isLinked ? <TextLink to={`/distributions/${overview.month}`}>{word}</TextLink> : word
}

function MonthBody({ overview }: { overview: MonthOverview }) {
  return (
    <>
      <MonthFigures overview={overview} />
      <div className="mt-10">
        <Section title="Stations">
          <StationCounts overview={overview} />
          <StationCharts overview={overview} />
        </Section>
        <Section title="Airtime">
          <AirtimeCharts overview={overview} />
        </Section>
        <Section title="Played most">
          <TopRecordings overview={overview} />
        </Section>
      </div>
    </>
  )
}

function EmptyMonth({ month, latestHeld }: { month: string; latestHeld: string | undefined }) {
  const role = useRole()
  const isElsewhere = latestHeld !== undefined && latestHeld !== month
  return (
    <EmptyState
      title={`Nothing is held of ${formatMonth(month)}`}
      action={
        <>
          {role !== 'auditor' && (
            <LinkButton to="/logs/new" tone="main">
              Send station logs
            </LinkButton>
          )}
          {isElsewhere && (
            <LinkButton to={`/?month=${latestHeld}`}>{`Go to ${formatMonth(latestHeld)}`}</LinkButton>
          )}
          <LinkButton to="/stations">See the stations</LinkButton>
        </>
      }
    >
      {role === 'auditor'
        ? 'No station has sent a log of this month, so there is nothing to check yet.'
        : 'No station has sent a log of this month. Logs usually come from the stations; those sent to the desk by other means can be sent in from here.'}
    </EmptyState>
  )
}
