import { listLogs, monthSchema, type StationView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Pencil, Upload } from 'lucide-react'
import { useParams, useSearchParams } from 'react-router'
import { LinkButton } from '../../components/button.tsx'
import { DefinitionList } from '../../components/definition-list.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { monthsQuery } from '../../lib/reference-queries.ts'
import { useRole } from '../../lib/session.ts'
import { StationLicences } from './station-licences.tsx'
import { StationMonth } from './station-month.tsx'
import { lastLogQuery, stationQuery } from './stations-queries.ts'

export function StationPage() {
  const { stationId = '' } = useParams()
  const station = useQuery(stationQuery(stationId))
  return (
    <QueryState query={station} loading="Fetching the station">
      {(data) => <StationDetails station={data} />}
    </QueryState>
  )
}

function StationDetails({ station }: { station: StationView }) {
  return (
    <>
      <PageHeader
        title={station.name}
        breadcrumbs={[{ label: 'Stations', to: '/stations' }]}
        aside={<span className="figures text-slate">{station.callName}</span>}
        actions={
          <>
            {station.canEdit && (
              <LinkButton to={`/stations/${station.id}/edit`} icon={Pencil}>
                Edit the profile
              </LinkButton>
            )}
            {station.canUpload && (
              <LinkButton to={`/logs/new?stationId=${station.id}`} tone="main" icon={Upload}>
                Send station logs
              </LinkButton>
            )}
          </>
        }
      />
      <ChosenMonth station={station} />
      <StationLicences station={station} />
      <Section title="Profile">
        <Profile station={station} />
      </Section>
    </>
  )
}

function ChosenMonth({ station }: { station: StationView }) {
  const [search, setSearch] = useSearchParams()
  const asked = monthSchema.safeParse(search.get('month'))
  const months = useQuery({ ...monthsQuery(), enabled: !asked.success })
  const showMonth = (month: string) => setSearch({ month }, { replace: true, preventScrollReset: true })
  if (asked.success) return <StationMonth station={station} month={asked.data} onMonthChange={showMonth} />
  return (
    <QueryState query={months} loading="Finding the month the desk works on">
      {({ current }) => <StationMonth station={station} month={current} onMonthChange={showMonth} />}
    </QueryState>
  )
}

function Profile({ station }: { station: StationView }) {
  const role = useRole()
  const maySeeLogs = listLogs.access.some((reader) => reader === role)
  const lastLog = useQuery({ ...lastLogQuery(station.id), enabled: maySeeLogs })
  const last = lastLog.data?.items[0]
  return (
    <DefinitionList
      items={[
        { term: 'Call name', value: <span className="figures">{station.callName}</span> },
        { term: 'Time zone', value: station.timeZone },
        { term: 'Contact', value: station.contactEmail ?? 'No address given' },
        last === undefined
          ? null
          : {
              term: 'Latest log',
              value: (
                <TextLink to={`/logs/${last.id}`}>
                  <StationTime instant={last.startedAt} timeZone={station.timeZone} />
                </TextLink>
              ),
            },
      ]}
    />
  )
}
