import type { EndpointResult, getMonthOverview, Month, MonthStatus } from '@fieldfare/contracts'
import type { StationCoverage } from '../../records/coverage.repository.ts'
import type { MonthDays } from '../../records/months.ts'
import type { StationReference } from '../../records/references.ts'
import type { AirtimeSum, PlaySum } from './overview-airtime.repository.ts'
import type { LogCount, TopRecording } from './overview.repository.ts'

type OverviewInput = EndpointResult<typeof getMonthOverview>
type Totals = Pick<
  OverviewInput['days'][number],
  'heldSeconds' | 'musicSeconds' | 'identifiedSeconds' | 'plays'
>

export type OverviewFacts = {
  month: Month
  days: MonthDays
  status: MonthStatus
  stations: readonly StationReference[]
  coverage: readonly StationCoverage[]
  airtime: readonly AirtimeSum[]
  plays: readonly PlaySum[]
  logs: readonly LogCount[]
  waiting: readonly { stationId: string; waiting: number }[]
  openDisputes: number
  topRecordings: readonly TopRecording[]
}

type SumKey = Pick<AirtimeSum, 'stationId' | 'day' | 'hour'>

/** The sums of one station, one day or one hour. */
function totalsWhere(facts: OverviewFacts, isMeant: (key: SumKey) => boolean): Totals {
  const secondsOf = (kind: AirtimeSum['kind']) =>
    facts.airtime.find((sum) => sum.kind === kind && isMeant(sum))?.seconds ?? 0
  return {
    heldSeconds: secondsOf('held'),
    musicSeconds: secondsOf('music'),
    identifiedSeconds: secondsOf('identified'),
    plays: facts.plays.find(isMeant)?.plays ?? 0,
  }
}

function sum<Item>(items: readonly Item[], valueOf: (item: Item) => number): number {
  return items.reduce((total, item) => total + valueOf(item), 0)
}

function daysBetween({ firstDay, nextFirstDay }: MonthDays): string[] {
  const days: string[] = []
  for (let day = Date.parse(firstDay); day < Date.parse(nextFirstDay); day += 86_400_000) {
    days.push(new Date(day).toISOString().slice(0, 10))
  }
  return days
}

function presentStations(facts: OverviewFacts): OverviewInput['stations'] {
  return facts.stations.map((station) => ({
    station: { id: station.id, callName: station.callName, name: station.name, timeZone: station.timeZone },
    ...totalsWhere(facts, ({ stationId }) => stationId === station.id),
    expectedSeconds: facts.coverage.find(({ stationId }) => stationId === station.id)?.expectedSeconds ?? 0,
    logs: facts.logs.find(({ stationId }) => stationId === station.id)?.logs ?? 0,
    waitingForReview: facts.waiting.find(({ stationId }) => stationId === station.id)?.waiting ?? 0,
  }))
}

export function presentOverview(facts: OverviewFacts): OverviewInput {
  const stations = presentStations(facts)
  return {
    month: facts.month,
    status: facts.status,
    totals: {
      heldSeconds: sum(stations, (station) => station.heldSeconds),
      musicSeconds: sum(stations, (station) => station.musicSeconds),
      identifiedSeconds: sum(stations, (station) => station.identifiedSeconds),
      plays: sum(stations, (station) => station.plays),
      expectedSeconds: sum(stations, (station) => station.expectedSeconds),
      waitingForReview: sum(stations, (station) => station.waitingForReview),
      openDisputes: facts.openDisputes,
      logsInWork: sum(facts.logs, ({ inWork }) => inWork),
      logsRefused: sum(facts.logs, ({ refused }) => refused),
    },
    stations,
    days: daysBetween(facts.days).map((day) => ({ day, ...totalsWhere(facts, (key) => key.day === day) })),
    hours: Array.from({ length: 24 }, (_, hour) => ({
      hour,
      ...totalsWhere(facts, (key) => key.hour === hour),
    })),
    topRecordings: facts.topRecordings.map(({ recording, plays, seconds }) => ({
      recording: {
        id: recording.id,
        isrc: recording.isrc,
        title: recording.title,
        artist: recording.artist,
      },
      plays,
      seconds,
    })),
  }
}
