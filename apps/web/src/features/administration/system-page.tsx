import type { SystemHealth } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Count } from '../../components/figures.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { EmptyState, ErrorState, QueryState } from '../../components/states.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { formatBytes, formatCount } from '../../lib/format.ts'
import { systemQuery } from './administration-queries.ts'
import { PlainTable } from './plain-table.tsx'

export function SystemPage() {
  const system = useQuery(systemQuery())
  return (
    <>
      <PageHeader title="System" lead="Whether everything runs. Looked at anew every five seconds." />
      {system.data !== undefined && system.error !== null && (
        <div className="mb-6">
          <ErrorState error={system.error} />
        </div>
      )}
      <QueryState query={system} loading="Asking the system">
        {(health) => <Health health={health} />}
      </QueryState>
    </>
  )
}

function Health({ health }: { health: SystemHealth }) {
  return (
    <>
      <Section title="Services">
        <Services health={health} />
      </Section>
      <Section title="Queues" lead="What workers have to do, are doing and have done.">
        <Queues queues={health.queues} />
      </Section>
      <Section title="Workers" lead="Each worker keeps the fingerprints of the catalogue in memory.">
        <Workers workers={health.workers} />
      </Section>
      <Section title="Recent failures">
        <Failures health={health} />
      </Section>
    </>
  )
}

function Working({ isOk, children }: { isOk: boolean; children: ReactNode }) {
  return (
    <span className="flex flex-wrap gap-x-4">
      <StatusTag tone={isOk ? 'good' : 'bad'}>{isOk ? 'Works' : 'Does not answer'}</StatusTag>
      <span className="text-slate">{children}</span>
    </span>
  )
}

function Services({ health: { checkedAt, database, redis, storage } }: { health: SystemHealth }) {
  return (
    <DefinitionList
      items={[
        {
          term: 'Database',
          value: (
            <Working isOk={database.ok}>
              PostgreSQL {database.version}, {formatBytes(database.sizeBytes)}
            </Working>
          ),
        },
        { term: 'Job queue', value: <Working isOk={redis.ok}>Redis</Working> },
        {
          term: 'Storage',
          value: (
            <Working isOk={storage.ok}>
              {storage.kind === 'disk' ? 'Disk' : 'S3-compatible store'}, {formatCount(storage.objects)}{' '}
              files, {formatBytes(storage.bytes)}
            </Working>
          ),
        },
        { term: 'Looked at', value: <SocietyTime instant={checkedAt} precision="second" /> },
      ]}
    />
  )
}

function Queues({ queues }: Pick<SystemHealth, 'queues'>) {
  return (
    <PlainTable
      caption="Queues"
      head={['Work', 'Waiting', 'Running', 'Done in a day', 'Failed in a day', 'Oldest waits since']}
      figureFrom={1}
      rows={queues.map((queue) => ({
        key: queue.kind,
        cells: [
          queue.label,
          <Count key="waiting" value={queue.waiting} />,
          <Count key="running" value={queue.running} />,
          <Count key="done" value={queue.doneLastDay} />,
          queue.failedLastDay === 0 ? (
            <Count key="failed" value={0} />
          ) : (
            <StatusTag key="failed" tone="bad">
              <Count value={queue.failedLastDay} />
            </StatusTag>
          ),
          queue.oldestWaitingAt === null ? '–' : <SocietyTime key="oldest" instant={queue.oldestWaitingAt} />,
        ],
      }))}
    />
  )
}

function Workers({ workers }: Pick<SystemHealth, 'workers'>) {
  if (workers.length === 0) {
    return (
      <EmptyState title="No worker is running">
        Logs, fingerprints and statements wait until one is started on this installation.
      </EmptyState>
    )
  }
  return (
    <PlainTable
      caption="Workers"
      head={['Worker', 'Recordings in memory', 'Memory of the index', 'Last seen']}
      figureFrom={1}
      rows={workers.map((worker) => ({
        key: worker.name,
        cells: [
          worker.name,
          <Count key="recordings" value={worker.indexRecordings} />,
          <span key="bytes" className="figures">
            {formatBytes(worker.indexBytes)}
          </span>,
          <SocietyTime key="seen" instant={worker.lastSeenAt} precision="second" />,
        ],
      }))}
    />
  )
}

function Failures({ health: { recentFailures: failures, queues } }: { health: SystemHealth }) {
  const labels = new Map(queues.map(({ kind, label }) => [kind, label]))
  if (failures.length === 0) return <p className="text-slate">Nothing failed lately.</p>
  return (
    <PlainTable
      caption="Recent failures"
      head={['When', 'Work', 'What happened']}
      rows={failures.map((failure) => ({
        key: `${failure.failedAt} ${failure.kind} ${failure.message}`,
        cells: [
          <SocietyTime key="at" instant={failure.failedAt} />,
          labels.get(failure.kind) ?? failure.kind,
          failure.message,
        ],
      }))}
    />
  )
}
