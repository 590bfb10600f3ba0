import fc from 'fast-check'
import {
  type DistributionInput,
  type LicenceInput,
  type PlayInput,
  type ShareInput,
} from '../distribution/input.ts'

/** A licence for the whole of November, all of it for works unless told otherwise. */
export function licence(overrides: Partial<LicenceInput> = {}): LicenceInput {
  return {
    stationId: 'station-1',
    monthlyFeeMinor: 10_000n,
    coveredDays: 30,
    daysInMonth: 30,
    worksPartPpm: 1_000_000,
    heldSeconds: 2_592_000,
    expectedSeconds: 2_592_000,
    ...overrides,
  }
}

/** A play of three minutes on 10 November. */
export function play(overrides: Partial<PlayInput> & { playId: string }): PlayInput {
  return {
    stationId: 'station-1',
    recordingId: 'recording-1',
    workId: 'work-1',
    localDate: '2026-11-10',
    creditedSeconds: 180,
    ...overrides,
  }
}

/** The whole of a work, for ever. */
export function share(overrides: Partial<ShareInput> = {}): ShareInput {
  return {
    right: 'works',
    subjectId: 'work-1',
    partyId: 'party-a',
    sharePpm: 1_000_000,
    validFrom: '2020-01-01',
    validTo: null,
    ...overrides,
  }
}

/** A month in euro without deductions. */
export function month(overrides: Partial<DistributionInput> = {}): DistributionInput {
  return {
    month: '2026-11',
    currency: 'EUR',
    rules: { minimumSeconds: 0, capSecondsPerPlay: null, version: '2026-1' },
    deductions: [],
    licences: [licence()],
    plays: [],
    shares: [],
    ...overrides,
  }
}

const localDate = fc.integer({ min: 1, max: 30 }).map((day) => `2026-11-${String(day).padStart(2, '0')}`)
const stationId = fc.constantFrom('station-1', 'station-2', 'station-3', 'station-unlicensed')
const recordingId = fc.integer({ min: 1, max: 6 }).map((index) => `recording-${index}`)
const workId = fc.integer({ min: 1, max: 4 }).map((index) => `work-${index}`)

const licences = fc.uniqueArray(
  fc.record({
    stationId: fc.constantFrom('station-1', 'station-2', 'station-3'),
    monthlyFeeMinor: fc.oneof(fc.bigInt(0n, 5n), fc.bigInt(0n, 10n ** 9n)),
    coveredDays: fc.integer({ min: 0, max: 30 }),
    daysInMonth: fc.constant(30),
    worksPartPpm: fc.oneof(fc.constantFrom(0, 1_000_000), fc.integer({ min: 0, max: 1_000_000 })),
    heldSeconds: fc.nat(2_592_000),
    expectedSeconds: fc.constant(2_592_000),
  }),
  { selector: (candidate) => candidate.stationId, maxLength: 3 },
)

const plays = fc
  .array(
    fc.record({
      stationId,
      recordingId,
      workId: fc.option(workId, { freq: 5 }),
      localDate,
      creditedSeconds: fc.double({ min: 0, max: 900, noNaN: true }),
    }),
    { maxLength: 40 },
  )
  .map((list) => list.map((item, index) => ({ ...item, playId: `play-${index}` })))

const shares = fc.array(
  fc
    .record({
      right: fc.constantFrom('works' as const, 'recordings' as const),
      index: fc.integer({ min: 1, max: 5 }),
      partyId: fc.constantFrom('party-a', 'party-b', 'party-c'),
      sharePpm: fc.constantFrom(0, 1, 250_000, 333_333, 500_000, 666_667, 1_000_000),
      validFrom: fc.oneof(fc.constant('2020-01-01'), localDate),
      validTo: fc.option(localDate, { freq: 2 }),
    })
    .map(({ index, ...rest }) => ({
      ...rest,
      subjectId: rest.right === 'works' ? `work-${index}` : `recording-${index}`,
    })),
  { maxLength: 25 },
)

/** Months with everything that goes wrong in them: unknown works, gaps, over-claims, expiries, fees of one unit. */
export const anyMonth: fc.Arbitrary<DistributionInput> = fc.record({
  month: fc.constant('2026-11'),
  currency: fc.constantFrom('JPY', 'EUR', 'KWD'),
  rules: fc.record({
    minimumSeconds: fc.constantFrom(0, 10, 30),
    capSecondsPerPlay: fc.constantFrom(null, 300),
    version: fc.constant('2026-1'),
  }),
  deductions: fc.constantFrom(
    [],
    [
      { code: 'administration', label: 'Administration', ratePpm: 125_000 },
      { code: 'social', label: 'Social and cultural purposes', ratePpm: 33_333 },
    ],
    [{ code: 'everything', label: 'Everything', ratePpm: 1_000_000 }],
  ),
  licences,
  plays,
  shares,
})
