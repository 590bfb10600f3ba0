import type { StatementView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useParams } from 'react-router'
import { PageHeader } from '../../components/page-header.tsx'
import { Pagination } from '../../components/pagination.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { LinePlay } from './line-play.tsx'
import { statementLinePlaysQuery, statementQuery } from './statements-queries.ts'

export function StatementLinePage() {
  const { statementId = '', lineNumber = '' } = useParams()
  const statement = useQuery(statementQuery(statementId))
  return (
    <QueryState query={statement} loading="Fetching the statement">
      {(data) => <LineDetails statement={data} lineNumber={lineNumber} />}
    </QueryState>
  )
}

function LineDetails({ statement, lineNumber }: { statement: StatementView; lineNumber: string }) {
  const search = useListSearch({ filters: [] })
  const plays = useQuery(statementLinePlaysQuery(statement.id, lineNumber, search.query))
  const [disputedId, setDisputedId] = useState<string | null>(null)
  return (
    <>
      <PageHeader
        title={`Line ${lineNumber}`}
        breadcrumbs={[
          { label: 'Statements', to: '/statements' },
          {
            label: `${statement.party.name}, ${formatMonth(statement.month)}`,
            to: `/statements/${statement.id}`,
          },
        ]}
        lead="Every play behind this line, in the order it was heard."
      />
      <QueryState query={plays} loading="Fetching the plays">
        {({ items, total }) =>
          items.length === 0 ? (
            <EmptyState title="No plays behind this line">
              The line was not made from plays of this month. Its amount stands on the statement.
            </EmptyState>
          ) : (
            <div className="grid gap-3">
              <ol className="divide-y divide-hairline border-y border-ink">
                {items.map((play) => (
                  <LinePlay
                    key={play.id}
                    play={play}
                    isDisputing={disputedId === play.id}
                    onDispute={(isOn) => setDisputedId(isOn ? play.id : null)}
                  />
                ))}
              </ol>
              <Pagination
                page={search.page}
                pageSize={search.pageSize}
                total={total}
                noun="plays"
                onPageChange={search.setPage}
                onPageSizeChange={search.setPageSize}
              />
            </div>
          )
        }
      </QueryState>
    </>
  )
}
