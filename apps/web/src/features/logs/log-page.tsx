import { analyseLogAgain, type StationLogView } from '@fieldfare/contracts'
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { RotateCw } from 'lucide-react'
import { useNavigate, useParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { AirtimeRibbon } from '../../components/ribbon/airtime-ribbon.tsx'
import { EmptyState, ErrorState, QueryState } from '../../components/states.tsx'
import { callApi } from '../../lib/api-client.ts'
import { formatInstant } from '../../lib/format-time.ts'
import { queryRoots } from '../../lib/query-roots.ts'
import { showToast } from '../../lib/toasts.ts'
import { useLiveLogs } from './live-logs.ts'
import { LogDetections } from './log-detections.tsx'
import { LogFacts } from './log-facts.tsx'
import { LogProgressBar, LogStatusTag } from './log-state.tsx'
import { logQuery, type LogDetail } from './logs-queries.ts'

export function LogPage() {
  const { logId = '' } = useParams()
  const log = useQuery(logQuery(logId))
  useLiveLogs()
  return (
    <QueryState query={log} loading="Fetching the station log">
      {(detail) => <LogView detail={detail} />}
    </QueryState>
  )
}

function LogView({ detail }: { detail: LogDetail }) {
  const { log } = detail
  const queryClient = useQueryClient()
  const again = useMutation({
    mutationFn: () => callApi(analyseLogAgain, { params: { logId: log.id } }),
    onSuccess: async () => {
      showToast('The log is queued to be analysed again.')
      await queryClient.invalidateQueries({ queryKey: queryRoots.logs })
    },
  })
  return (
    <>
      <PageHeader
        title={`${log.station.name}, ${formatInstant(log.startedAt, log.station.timeZone)}`}
        breadcrumbs={[{ label: 'Station logs', to: '/logs' }]}
        aside={<LogStatusTag status={log.status} />}
        actions={
          log.canAnalyseAgain && (
            <Button icon={RotateCw} busy={again.isPending} onClick={() => again.mutate()}>
              Analyse again
            </Button>
          )
        }
      />
      <div className="grid gap-4">
        {again.error !== null && <ErrorState error={again.error} />}
        <LogNotices log={log} />
      </div>
      <Section title="Airtime">
        <LogAirtime detail={detail} />
      </Section>
      {log.status === 'analysed' && (
        <Section title="Found in this log">
          <LogDetections logId={log.id} />
        </Section>
      )}
      <Section title="The recording">
        <LogFacts log={log} />
      </Section>
    </>
  )
}

function LogNotices({ log }: { log: StationLogView }) {
  return (
    <>
      {log.status === 'analysing' && log.progress !== null && <LogProgressBar progress={log.progress} />}
      {log.status === 'queued' && (
        <Notice title="Waiting for its turn">
          The analysis begins by itself as soon as a worker is free; this page shows it.
        </Notice>
      )}
      {log.failure !== null && (
        <Notice
          tone="bad"
          title={log.status === 'rejected' ? 'This file could not be used' : 'The analysis failed'}
          actions={
            log.status === 'rejected' && (
              <LinkButton to={`/logs/new?stationId=${log.station.id}`}>Send another file</LinkButton>
            )
          }
        >
          {log.failure.message}
        </Notice>
      )}
      {log.warnings.length > 0 && (
        <Notice tone="warn" title="Worth a look">
          <ul className="list-disc pl-5">
            {log.warnings.map((warning) => (
              <li key={warning}>{warning}</li>
            ))}
          </ul>
        </Notice>
      )}
    </>
  )
}

function LogAirtime({ detail: { log, spans } }: { detail: LogDetail }) {
  const navigate = useNavigate()
  if (log.endedAt === null || spans.length === 0) {
    return (
      <EmptyState title="Nothing to draw yet">
        {log.failure === null
          ? 'The ribbon of this log appears once it has been analysed.'
          : 'Nothing could be read from this file.'}
      </EmptyState>
    )
  }
  return (
    <AirtimeRibbon
      label={`Airtime of ${log.station.name} in ${log.fileName}`}
      from={log.startedAt}
      to={log.endedAt}
      timeZone={log.station.timeZone}
      spans={spans}
      onOpen={(span) => {
        if (span.detectionId !== null) void navigate(`/detections/${span.detectionId}`)
      }}
    />
  )
}
