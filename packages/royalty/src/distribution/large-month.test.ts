import { expect, it } from 'vitest'
import { licence, month, play, share } from '../testing/months.ts'
import { calculateDistribution } from './calculate-distribution.ts'
import { checkClosed } from './check-closed.ts'

/** Far above what it takes, so that only a cost out of proportion to the number of plays fails it. */
const PATIENCE_MS = 30_000

it(
  'divides a month of 100,000 plays on 40 stations and closes it',
  () => {
    const stationIds = Array.from({ length: 40 }, (_, index) => `station-${index}`)
    const plays = Array.from({ length: 100_000 }, (_, index) =>
      play({
        playId: `play-${index}`,
        stationId: stationIds[index % stationIds.length] ?? '',
        recordingId: `recording-${(index * 7919) % 5000}`,
        workId: `work-${(index * 7919) % 4500}`,
        localDate: `2026-11-${String((index % 30) + 1).padStart(2, '0')}`,
        creditedSeconds: 120 + (index % 180) + 0.25,
      }),
    )
    const shares = Array.from({ length: 5000 }, (_, index) => [
      share({ subjectId: `work-${index}`, partyId: `party-${index % 300}`, sharePpm: 500_000 }),
      share({ subjectId: `work-${index}`, partyId: `party-${(index + 7) % 300}`, sharePpm: 333_333 }),
      share({ right: 'recordings', subjectId: `recording-${index}`, partyId: `party-${index % 90}` }),
    ]).flat()
    const distribution = calculateDistribution(
      month({
        licences: stationIds.map((stationId) =>
          licence({ stationId, monthlyFeeMinor: 1_234_567n, worksPartPpm: 650_000 }),
        ),
        plays,
        shares,
      }),
    )
    expect(distribution.totals.playsCounted).toBe(100_000)
    expect(distribution.totals.feeMinor).toBe(40n * 1_234_567n)
    expect(checkClosed(distribution)).toEqual([])
  },
  PATIENCE_MS,
)
