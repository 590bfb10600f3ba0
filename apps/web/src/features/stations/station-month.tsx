import {
  getDetection,
  type EndpointOutput,
  type getStationMonth,
  type StationView,
} from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { LinkButton } from '../../components/button.tsx'
import { KeyFigures } from '../../components/definition-list.tsx'
import { Count } from '../../components/figures.tsx'
import { MonthStepper } from '../../components/month-stepper.tsx'
import { Section } from '../../components/page-header.tsx'
import { RibbonWeave } from '../../components/ribbon/ribbon-weave.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { currentMonth, formatMonth } from '../../lib/format-time.ts'
import { formatHours } from '../../lib/format.ts'
import { useRole } from '../../lib/session.ts'
import { stationMonthQuery } from './stations-queries.ts'

type MonthAirtime = EndpointOutput<typeof getStationMonth>

type StationMonthProps = { station: StationView; month: string; onMonthChange: (month: string) => void }

/** The month woven from its days, with the figures that sum it up. */
export function StationMonth({ station, month, onMonthChange }: StationMonthProps) {
  const airtime = useQuery(stationMonthQuery(station.id, month))
  return (
    <Section
      title="The month"
      lead={`Each ribbon is a day, midnight to midnight in ${station.timeZone}. Open one to look closer.`}
      actions={
        <MonthStepper month={month} onChange={onMonthChange} latest={currentMonth(station.timeZone)} />
      }
    >
      <QueryState query={airtime} loading={`Drawing ${formatMonth(month)}`}>
        {(data) => (
          <div className="grid gap-6">
            <MonthSums station={station} airtime={data} />
            {data.days.every(({ heldSeconds }) => heldSeconds === 0) && (
              <NothingHeld station={station} month={data.month} />
            )}
            <RibbonWeave
              label={`Airtime of ${station.name} in ${formatMonth(data.month)}`}
              days={data.days}
              dayHref={(day) => `/stations/${station.id}/days/${day}`}
            />
          </div>
        )}
      </QueryState>
    </Section>
  )
}

function sumOf(airtime: MonthAirtime, name: 'heldSeconds' | 'identifiedSeconds' | 'plays'): number {
  return airtime.days.reduce((sum, day) => sum + day[name], 0)
}

function MonthSums({ station, airtime }: { station: StationView; airtime: MonthAirtime }) {
  const role = useRole()
  const maySeePlays = getDetection.access.some((reader) => reader === role)
  const plays = <Count value={sumOf(airtime, 'plays')} />
  const heldDays = airtime.days.filter(({ heldSeconds }) => heldSeconds > 0).length
  return (
    <KeyFigures
      items={[
        {
          label: 'Plays',
          value: maySeePlays ? (
            <TextLink to={`/plays?stationId=${station.id}&month=${airtime.month}`}>{plays}</TextLink>
          ) : (
            plays
          ),
        },
        {
          label: 'Airtime held',
          value: formatHours(sumOf(airtime, 'heldSeconds')),
          detail: `on ${heldDays} of ${airtime.days.length} days`,
        },
        { label: 'Music identified', value: formatHours(sumOf(airtime, 'identifiedSeconds')) },
      ]}
    />
  )
}

function NothingHeld({ station, month }: { station: StationView; month: string }) {
  return (
    <EmptyState
      title={`Nothing is held of ${formatMonth(month)}`}
      action={
        station.canUpload && (
          <LinkButton to={`/logs/new?stationId=${station.id}`}>Send logs of this station</LinkButton>
        )
      }
    >
      The ribbons fill as logs of this month arrive.
    </EmptyState>
  )
}
