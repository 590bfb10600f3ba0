import type { DistributionView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useNavigate, useParams } from 'react-router'
import { Count } from '../../components/figures.tsx'
import { KeyFigures } from '../../components/definition-list.tsx'
import { Money } from '../../components/money.tsx'
import { MonthStepper } from '../../components/month-stepper.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { useServerEvents } from '../../lib/server-events.ts'
import { distributionQuery } from './distributions-queries.ts'
import { DistributionSteps } from './distribution-steps.tsx'
import { HoldbackTable } from './holdback-table.tsx'
import { MonthLine } from './month-line.tsx'
import { MonthStatusTag } from './month-status-tag.tsx'
import { PayeeTable } from './payee-table.tsx'
import { RunFacts } from './run-facts.tsx'
import { StationMoney } from './station-money.tsx'
import type { RunProgress } from './work-in-hand.tsx'

export function DistributionPage() {
  const { month = '' } = useParams()
  const distribution = useQuery(distributionQuery(month))
  const [progress, setProgress] = useState<RunProgress | null>(null)
  useServerEvents((event, queryClient) => {
    if (event.kind !== 'distribution-progress' || event.month !== month) return
    setProgress(event)
    if (event.status !== progress?.status) void refreshScopes(queryClient, 'distributions', 'statements')
  })
  return (
    <QueryState query={distribution} loading="Fetching the month">
      {(data) => <MonthDetails view={data} progress={progress} />}
    </QueryState>
  )
}

function MonthDetails({ view, progress }: { view: DistributionView; progress: RunProgress | null }) {
  const navigate = useNavigate()
  return (
    <>
      <PageHeader
        title={`Distribution of ${formatMonth(view.month)}`}
        breadcrumbs={[{ label: 'Distributions', to: '/distributions' }]}
        aside={<MonthStatusTag status={view.status} />}
        actions={
          <MonthStepper month={view.month} onChange={(month) => void navigate(`/distributions/${month}`)} />
        }
      />
      <div className="grid gap-6">
        <MonthLine view={view} />
        <DistributionSteps key={view.month} view={view} progress={progress} />
        {view.failure !== null && (
          <Notice tone="bad" title="The last run failed">
            {view.failure}
          </Notice>
        )}
        <Cautions cautions={view.cautions} status={view.status} />
      </div>
      {view.digest === null ? <NothingCalculated /> : <Result view={view} />}
    </>
  )
}

function Cautions({ cautions, status }: Pick<DistributionView, 'cautions' | 'status'>) {
  if (cautions.length === 0 || status === 'issued') return null
  return (
    <Notice tone="warn" title="Worth settling before this month goes on">
      <ul className="list-disc pl-5">
        {cautions.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </Notice>
  )
}

function NothingCalculated() {
  return (
    <Section title="Result">
      <EmptyState title="Nothing is calculated yet">
        Fees, deductions, pools and payees stand here once the month is calculated. It can be calculated again
        as often as needed until it is approved.
      </EmptyState>
    </Section>
  )
}

function Result({ view }: { view: DistributionView }) {
  return (
    <>
      <Section title="Result">
        <div className="grid gap-4">
          <KeyFigures
            items={[
              { label: 'Licence fees', value: <Money amountMinor={view.feeMinor ?? '0'} /> },
              { label: 'Net after deductions', value: <Money amountMinor={view.netMinor ?? '0'} /> },
              { label: 'To payees', value: <Money amountMinor={view.allocatedMinor ?? '0'} /> },
              { label: 'Held back', value: <Money amountMinor={view.heldBackMinor ?? '0'} /> },
              { label: 'Plays', value: <Count value={view.plays} /> },
              { label: 'Payees', value: <Count value={view.payees} /> },
            ]}
          />
          <RunFacts view={view} />
        </div>
      </Section>
      <Section
        title="By station"
        lead="From the fee of each station to what its plays earned. Net, allocated and held back add up to the unit."
      >
        <StationMoney view={view} />
      </Section>
      <Section
        title="Held back"
        lead="Kept for those who cannot be paid yet, with the reason; never given to others."
      >
        <HoldbackTable view={view} />
      </Section>
      <Section title="Payees" lead="What each party is due; its statement can be opened once it is made.">
        <PayeeTable view={view} />
      </Section>
      <p className="mt-10 max-w-[72ch] border-t border-hairline pt-4 text-sm text-slate">
        Statements are computed from evidence and the society’s own rules; they are not legal or tax advice.
        Contracts, local law and the society’s distribution rules prevail.
      </p>
    </>
  )
}
