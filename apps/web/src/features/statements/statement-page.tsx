import type { StatementView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Code } from '../../components/figures.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { formatDay, formatMonth } from '../../lib/format-time.ts'
import { useRole, useSession } from '../../lib/session.ts'
import { HowToQuestion } from './how-to-question.tsx'
import { StatementAccount } from './statement-account.tsx'
import { StatementFiles } from './statement-files.tsx'
import { StatementHoldbacks } from './statement-holdbacks.tsx'
import { StatementLines } from './statement-lines.tsx'
import { StatementStations } from './statement-stations.tsx'
import { StatementStatusTag } from './statement-status.tsx'
import { statementQuery } from './statements-queries.ts'

export function StatementPage() {
  const { statementId = '' } = useParams()
  const statement = useQuery(statementQuery(statementId))
  return (
    <QueryState query={statement} loading="Fetching the statement">
      {(data) => <StatementDetails statement={data} />}
    </QueryState>
  )
}

function StatementDetails({ statement }: { statement: StatementView }) {
  return (
    <>
      <PageHeader
        title={`Statement for ${formatMonth(statement.month)}`}
        breadcrumbs={[{ label: 'Statements', to: '/statements' }]}
        aside={<StatementStatusTag status={statement.status} />}
        lead={statement.party.name}
        actions={<StatementFiles statement={statement} isMain />}
      />
      {statement.status === 'draft' && (
        <div className="mb-6">
          <Notice title="This is a draft">
            It can still change, and its payee does not see it. The PDF and the CSV are made when the month is
            issued.
          </Notice>
        </div>
      )}
      <StatementFacts statement={statement} />
      <Section title="From gross to net">
        <StatementAccount statement={statement} />
      </Section>
      <Section
        title="By station"
        lead="Where the money was earned, and how much of the month was held in logs."
      >
        <StatementStations statement={statement} />
      </Section>
      <Section
        title="Held back"
        lead="Money from plays of this payee’s music that could not be paid to everybody yet."
      >
        <StatementHoldbacks statement={statement} />
      </Section>
      <Section title="Lines" lead="Open a line to see every play behind it.">
        <StatementLines statement={statement} />
      </Section>
      <HowToQuestion />
    </>
  )
}

function StatementFacts({ statement }: { statement: StatementView }) {
  const { society } = useSession()
  const isStaff = useRole() !== 'publisher'
  const { party } = statement
  return (
    <DefinitionList
      items={[
        {
          term: 'Payee',
          value: (
            <span className="flex flex-wrap gap-x-4">
              {party.name}
              {party.ipi !== null && <Code kind="ipi" value={party.ipi} withLabel />}
            </span>
          ),
        },
        { term: 'Statement number', value: <span className="figures">{statement.number}</span> },
        {
          term: 'Period of use',
          value: `${formatDay(statement.periodFrom)} to ${formatDay(statement.periodTo)}, as each station’s clock had it`,
        },
        { term: 'Currency', value: statement.currency },
        { term: 'Rule version', value: statement.ruleVersion },
        statement.issuedAt === null
          ? null
          : {
              term: 'Issued',
              value: <SocietyTime instant={statement.issuedAt} />,
            },
        isStaff ? { term: 'Issued by', value: society.name } : null,
      ]}
    />
  )
}
