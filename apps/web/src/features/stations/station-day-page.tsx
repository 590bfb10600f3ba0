import { getDetection, type EndpointOutput, type getStationDay, type StationView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { ArrowLeft, ArrowRight } from 'lucide-react'
import { DateTime } from 'luxon'
import { useMemo } from 'react'
import { useNavigate, useParams } from 'react-router'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { KeyFigures } from '../../components/definition-list.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { AirtimeRibbon } from '../../components/ribbon/airtime-ribbon.tsx'
import { eventKinds, ribbonSpans } from '../../components/ribbon/ribbon-spans.ts'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { formatDay } from '../../lib/format-time.ts'
import { formatHours } from '../../lib/format.ts'
import { useRole } from '../../lib/session.ts'
import { dayColumns, type DayRow } from './day-columns.tsx'
import { todayIn } from './licences.ts'
import { stationDayQuery, stationQuery } from './stations-queries.ts'

type DayAirtime = EndpointOutput<typeof getStationDay>

export function StationDayPage() {
  const { stationId = '', day = '' } = useParams()
  const station = useQuery(stationQuery(stationId))
  const airtime = useQuery(stationDayQuery(stationId, day))
  return (
    <QueryState query={station} loading="Fetching the station">
      {(found) => (
        <QueryState query={airtime} loading="Drawing the day">
          {(data) => <DayView station={found} airtime={data} />}
        </QueryState>
      )}
    </QueryState>
  )
}

function shiftDay(day: string, count: number): string {
  return DateTime.fromISO(day, { zone: 'utc' }).plus({ days: count }).toFormat('yyyy-MM-dd')
}

function DayView({ station, airtime }: { station: StationView; airtime: DayAirtime }) {
  const addressOf = (day: string) => `/stations/${station.id}/days/${day}`
  const next = shiftDay(airtime.day, 1)
  const { day } = airtime
  return (
    <>
      <PageHeader
        title={`${station.name}, ${formatDay(day)}`}
        lead={`Midnight to midnight in ${airtime.timeZone}.`}
        breadcrumbs={[
          { label: 'Stations', to: '/stations' },
          { label: station.name, to: `/stations/${station.id}?month=${day.slice(0, 7)}` },
        ]}
        actions={
          <>
            <LinkButton to={addressOf(shiftDay(day, -1))} icon={ArrowLeft}>
              Day before
            </LinkButton>
            {next <= todayIn(airtime.timeZone) && (
              <LinkButton to={addressOf(next)} icon={ArrowRight}>
                Day after
              </LinkButton>
            )}
          </>
        }
      />
      <DayPicture station={station} airtime={airtime} />
      <Section title="Plays and gaps">
        <DayTable station={station} airtime={airtime} />
      </Section>
    </>
  )
}

function DayPicture({ station, airtime }: { station: StationView; airtime: DayAirtime }) {
  const navigate = useNavigate()
  const role = useRole()
  const maySeeEvidence = getDetection.access.some((reader) => reader === role)
  const open = ({ detectionId, logId }: { detectionId: string | null; logId: string | null }) => {
    if (detectionId !== null) void navigate(`/detections/${detectionId}`)
    else if (logId !== null) void navigate(`/logs/${logId}`)
  }
  return (
    <div className="mb-10 grid gap-6">
      <KeyFigures
        items={[
          {
            label: 'Airtime held',
            value: formatHours(airtime.heldSeconds),
            detail: `of ${formatHours((Date.parse(airtime.to) - Date.parse(airtime.from)) / 1000)}`,
          },
          { label: 'Music', value: formatHours(airtime.musicSeconds) },
          { label: 'Music identified', value: formatHours(airtime.identifiedSeconds) },
        ]}
      />
      <AirtimeRibbon
        label={`Airtime of ${station.name} on ${formatDay(airtime.day)}`}
        from={airtime.from}
        to={airtime.to}
        timeZone={airtime.timeZone}
        spans={airtime.spans}
        {...(maySeeEvidence ? { onOpen: open } : {})}
      />
    </div>
  )
}

function DayTable({ station, airtime }: { station: StationView; airtime: DayAirtime }) {
  const { spans, from, to, timeZone } = airtime
  const query = useMemo(() => {
    const bounds = { fromMs: Date.parse(from), toMs: Date.parse(to) }
    const items = ribbonSpans(spans, bounds)
      .filter(({ kind }) => eventKinds.has(kind) || kind === 'gap')
      .map((span): DayRow => ({ ...span, timeZone }))
    return { data: { items }, error: null, isFetching: false, refetch: () => undefined }
  }, [spans, from, to, timeZone])
  return (
    <DataTable
      name="station-day"
      caption={`Plays and gaps of ${station.name} on ${formatDay(airtime.day)}`}
      captionHidden
      noun="stretches"
      columns={dayColumns}
      query={query}
      rowId={(row) => row.key}
      empty={
        <EmptyState title="Held from midnight to midnight, and no music found in it">
          Music that is not in the catalogue cannot be found.
        </EmptyState>
      }
    />
  )
}
