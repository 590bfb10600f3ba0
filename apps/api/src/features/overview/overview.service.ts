import {
  monthSchema,
  type EndpointResult,
  type getMonthOverview,
  type listMonths,
  type Month,
} from '@fieldfare/contracts'
import { readSociety, type Scope } from '@fieldfare/database'
import { DateTime } from 'luxon'
import type { Dependencies } from '../../http/dependencies.ts'
import { readCoverage } from '../../records/coverage.repository.ts'
import { readMonthStatus } from '../../records/month.repository.ts'
import { daysOfMonth } from '../../records/months.ts'
import { sumAirtime, sumPlays } from './overview-airtime.repository.ts'
import {
  countLogs,
  countOpenDisputes,
  countWaiting,
  listHeldMonths,
  listStationReferences,
  listTopRecordings,
} from './overview.repository.ts'
import { presentOverview } from './overview.presenter.ts'

export function createOverviewService({ database, clock }: Dependencies) {
  return {
    async overview(scope: Scope, month: Month): Promise<EndpointResult<typeof getMonthOverview>> {
      const days = daysOfMonth(month)
      return presentOverview({
        month,
        days,
        status: await readMonthStatus(database, month),
        stations: await listStationReferences(database, scope),
        coverage: await readCoverage(database, scope, days, clock()),
        airtime: await sumAirtime(database, scope, days),
        plays: await sumPlays(database, scope, days),
        logs: await countLogs(database, scope, days),
        waiting: await countWaiting(database, scope, days),
        openDisputes: await countOpenDisputes(database, scope, days),
        topRecordings: await listTopRecordings(database, scope, days),
      })
    },

    /** The month the desk works on is the last one that is over where the society is. */
    async months(scope: Scope): Promise<EndpointResult<typeof listMonths>> {
      const society = await readSociety(database)
      const now = DateTime.fromJSDate(clock(), { zone: society.timeZone })
      const current = monthSchema.parse(now.minus({ months: 1 }).toFormat('yyyy-MM'))
      const held = await listHeldMonths(database, scope)
      if (held.some(({ month }) => month === current)) return { current, items: held }
      const withCurrent = [...held, { month: current, status: await readMonthStatus(database, current) }]
      return {
        current,
        items: withCurrent.sort((left, right) => right.month.localeCompare(left.month)),
      }
    },
  }
}
