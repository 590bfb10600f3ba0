import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { anyMonth, licence, month, play, share } from '../testing/months.ts'
import { calculateDistribution } from './calculate-distribution.ts'
import { assertClosed, checkClosed } from './check-closed.ts'
import { type Distribution } from './distribution.ts'
import { type DistributionInput } from './input.ts'
import { serialiseDistribution } from './serialise-distribution.ts'
import { worked } from '../testing/worked-example.ts'

function lineAmounts({ lines }: Distribution): (string | bigint)[][] {
  return lines.map(({ subjectId, partyId, amountMinor }) => [subjectId, partyId, amountMinor])
}

function heldAmounts({ holdbacks }: Distribution): (string | bigint | null)[][] {
  return holdbacks.map(({ subjectId, reason, amountMinor }) => [subjectId, reason, amountMinor])
}

describe('calculateDistribution', () => {
  it('comes to the amounts worked out by hand', () => {
    const distribution = calculateDistribution(worked)
    expect(checkClosed(distribution)).toEqual([])
    expect(distribution.stations[0]).toMatchObject({ feeMinor: 10_000n, netMinor: 8550n })
    expect(distribution.stations[0]?.pools.map(({ right, amountMinor }) => [right, amountMinor])).toEqual([
      ['works', 5301n],
      ['recordings', 3249n],
    ])
    expect(lineAmounts(distribution)).toEqual([
      ['work-1', 'party-a', 1375n],
      ['work-1', 'party-b', 1374n],
      ['work-2', 'party-a', 1571n],
      ['recording-1', 'party-c', 1685n],
    ])
    expect(heldAmounts(distribution)).toEqual([
      ['recording-3', 'no-work', 196n],
      ['work-2', 'shares-incomplete', 785n],
      ['recording-2', 'shares-over-claimed', 1444n],
      ['recording-3', 'no-shares', 120n],
    ])
    expect(distribution.totals).toMatchObject({ attributedMinor: 6005n, heldBackMinor: 2545n })
  })

  it('divides by fractions of a second', () => {
    // 500.00 over 210 s, 180 s and 3.75 s: quotas 266.6667, 228.5714, 4.7619; the cent left over goes to the first.
    const lengths = [210, 180, 3.75]
    const distribution = calculateDistribution(
      month({
        licences: [licence({ monthlyFeeMinor: 50_000n })],
        plays: lengths.map((creditedSeconds, index) =>
          play({ playId: `play-${index}`, workId: `work-${index}`, creditedSeconds }),
        ),
        shares: lengths.map((_, index) => share({ subjectId: `work-${index}` })),
      }),
    )
    expect(distribution.lines.map(({ amountMinor }) => amountMinor)).toEqual([26_667n, 22_857n, 476n])
  })

  it('pays by the shares of the day when they change within the month', () => {
    const distribution = calculateDistribution(
      month({
        plays: [
          play({ playId: 'last-old-day', localDate: '2026-11-15' }),
          play({ playId: 'first-new-day', localDate: '2026-11-16' }),
        ],
        shares: [
          share({ sharePpm: 1_000_000, validTo: '2026-11-15' }),
          share({ sharePpm: 400_000, validFrom: '2026-11-16' }),
          share({ partyId: 'party-b', sharePpm: 600_000, validFrom: '2026-11-16' }),
        ],
      }),
    )
    expect(
      distribution.lines.map((line) => [line.partyId, line.sharePpm, line.amountMinor, line.playIds]),
    ).toEqual([
      ['party-a', 400_000, 2000n, ['first-new-day']],
      ['party-a', 1_000_000, 5000n, ['last-old-day']],
      ['party-b', 600_000, 3000n, ['first-new-day']],
    ])
  })

  it('adds up the several shares one party holds in a work', () => {
    const distribution = calculateDistribution(
      month({
        plays: [play({ playId: 'play-1' })],
        shares: [share({ sharePpm: 250_000 }), share({ sharePpm: 750_000 })],
      }),
    )
    expect(distribution.lines.map(({ sharePpm, amountMinor }) => [sharePpm, amountMinor])).toEqual([
      [1_000_000, 10_000n],
    ])
  })

  it('names the parties whose shares are behind what is held back', () => {
    const overClaimed = calculateDistribution(
      month({
        plays: [play({ playId: 'play-1' })],
        shares: [share({ partyId: 'party-b' }), share({ partyId: 'party-a', sharePpm: 1 })],
      }),
    )
    expect(overClaimed.lines).toEqual([])
    expect(overClaimed.holdbacks).toMatchObject([
      { reason: 'shares-over-claimed', amountMinor: 10_000n, claimantPartyIds: ['party-a', 'party-b'] },
    ])
    const expired = calculateDistribution(
      month({ plays: [play({ playId: 'play-1' })], shares: [share({ validTo: '2026-11-09' })] }),
    )
    expect(expired.holdbacks).toMatchObject([
      { reason: 'no-valid-share', amountMinor: 10_000n, claimantPartyIds: ['party-a'] },
    ])
  })

  it('keeps the pools of a station that paid but played nothing that counts', () => {
    const distribution = calculateDistribution(
      month({
        rules: { minimumSeconds: 30, capSecondsPerPlay: null, version: '2026-1' },
        licences: [licence({ worksPartPpm: 600_000 })],
        plays: [play({ playId: 'play-1', creditedSeconds: 29.999 })],
        shares: [share()],
      }),
    )
    expect(
      distribution.holdbacks.map(({ right, reason, amountMinor }) => [right, reason, amountMinor]),
    ).toEqual([
      ['works', 'no-plays', 6000n],
      ['recordings', 'no-plays', 4000n],
    ])
    expect(distribution.totals).toMatchObject({ playsCounted: 0, playsBelowMinimum: 1 })
    assertClosed(distribution)
  })

  it('counts a play of exactly the minimum, and a long one up to the cap', () => {
    const distribution = calculateDistribution(
      month({
        rules: { minimumSeconds: 30, capSecondsPerPlay: 300, version: '2026-1' },
        plays: [
          play({ playId: 'shortest', workId: 'work-1', creditedSeconds: 30 }),
          play({ playId: 'long', workId: 'work-2', creditedSeconds: 900 }),
        ],
        shares: [share(), share({ subjectId: 'work-2' })],
      }),
    )
    // 30 : 300 of 100.00 = 9.0909 : 90.9090.
    expect(distribution.lines.map(({ creditedMs, amountMinor }) => [creditedMs, amountMinor])).toEqual([
      [30_000n, 909n],
      [300_000n, 9091n],
    ])
  })

  it('pays nothing for plays on a station without a licence, and says which', () => {
    const plays = ['play-2', 'play-1'].map((playId) => play({ playId, stationId: 'station-9' }))
    const distribution = calculateDistribution(month({ licences: [], plays, shares: [share()] }))
    expect(distribution.playIdsWithoutLicence).toEqual(['play-1', 'play-2'])
    expect(distribution.totals).toMatchObject({ feeMinor: 0n, playsWithoutLicence: 2 })
  })

  it.each(['JPY', 'EUR', 'KWD'])('gives a fee of one unit of %s to one party', (currency) => {
    const distribution = calculateDistribution(
      month({
        currency,
        licences: [licence({ monthlyFeeMinor: 1n, worksPartPpm: 600_000 })],
        plays: [play({ playId: 'play-1' })],
        shares: [share({ sharePpm: 500_000 }), share({ partyId: 'party-b', sharePpm: 500_000 })],
      }),
    )
    expect(lineAmounts(distribution)).toEqual([
      ['work-1', 'party-a', 1n],
      ['work-1', 'party-b', 0n],
    ])
    assertClosed(distribution)
  })

  it.each<[string, Partial<DistributionInput>]>([
    ['a play outside the month', { plays: [play({ playId: 'p', localDate: '2026-12-01' })] }],
    ['a play given twice', { plays: [play({ playId: 'p' }), play({ playId: 'p' })] }],
    ['a play of unknown length', { plays: [play({ playId: 'p', creditedSeconds: Number.NaN })] }],
    ['a play of negative length', { plays: [play({ playId: 'p', creditedSeconds: -1 })] }],
    ['an identifier with a space', { plays: [play({ playId: 'p 1' })] }],
    ['two licences of a station', { licences: [licence(), licence()] }],
    ['a negative fee', { licences: [licence({ monthlyFeeMinor: -1n })] }],
    ['a part above 100 %', { licences: [licence({ worksPartPpm: 1_000_001 })] }],
    ['a share in fractions', { shares: [share({ sharePpm: 0.5 })] }],
    ['a month that is none', { month: '2026-13' }],
  ])('refuses %s', (_what, overrides) => {
    expect(() => calculateDistribution(month(overrides))).toThrow(
      expect.objectContaining({ code: 'invalid-input' }),
    )
  })

  it('closes at every level in any month', () => {
    fc.assert(
      fc.property(anyMonth, (input) => {
        expect(checkClosed(calculateDistribution(input))).toEqual([])
      }),
      { numRuns: 300 },
    )
  })

  it('is the same, byte for byte, whatever the order of its input', () => {
    fc.assert(
      fc.property(anyMonth, fc.integer(), (input, seed) => {
        const shuffled: DistributionInput = {
          ...input,
          deductions: shuffle(input.deductions, seed),
          licences: shuffle(input.licences, seed),
          plays: shuffle(input.plays, seed),
          shares: shuffle(input.shares, seed),
        }
        expect(serialiseDistribution(calculateDistribution(shuffled))).toBe(
          serialiseDistribution(calculateDistribution(input)),
        )
      }),
    )
  })

  it('pays every party within two units of the exact sum over its single plays', () => {
    fc.assert(
      fc.property(anyMonth, (input) => {
        const distribution = calculateDistribution(input)
        for (const line of distribution.lines) {
          const { numerator, denominator } = exactLine(input, distribution, line)
          const distance = line.amountMinor * denominator - numerator
          expect(distance < 2n * denominator && distance > -2n * denominator).toBe(true)
        }
      }),
    )
  })
})

describe('checkClosed', () => {
  it('notices one unit moved anywhere', () => {
    const distribution = calculateDistribution(worked)
    const [line, ...lines] = distribution.lines
    const [holdback, ...holdbacks] = distribution.holdbacks
    const [station] = distribution.stations
    if (!line || !holdback || !station)
      throw new Error('The worked example has lines, holdbacks and a station.')
    const wrong: readonly Partial<Distribution>[] = [
      { lines: [{ ...line, amountMinor: line.amountMinor + 1n }, ...lines] },
      { lines },
      { holdbacks: [{ ...holdback, amountMinor: holdback.amountMinor - 1n }, ...holdbacks] },
      { stations: [{ ...station, feeMinor: station.feeMinor + 1n }] },
      { stations: [{ ...station, pools: station.pools.slice(1) }] },
      { totals: { ...distribution.totals, netMinor: 1n } },
      { lines: [{ ...line, playIds: [] }, ...lines] },
    ]
    for (const change of wrong) {
      expect(checkClosed({ ...distribution, ...change })).not.toEqual([])
      expect(() => assertClosed({ ...distribution, ...change })).toThrow(
        expect.objectContaining({ code: 'not-closed' }),
      )
    }
  })

  it('notices amounts that sum but are not in proportion', () => {
    const distribution = calculateDistribution(worked)
    const moved = distribution.lines.map((line) => {
      if (line.subjectId !== 'work-1') return line
      const amountMinor = line.partyId === 'party-a' ? line.amountMinor + 10n : line.amountMinor - 10n
      return { ...line, amountMinor }
    })
    expect(checkClosed({ ...distribution, lines: moved }).map(({ where }) => where)).toEqual([
      'station-1 works work work-1: quota',
      'station-1 works work work-1: quota',
    ])
  })
})

/** Deterministic Fisher-Yates with a small multiplicative generator. */
function shuffle<Item>(items: readonly Item[], seed: number): Item[] {
  let state = (Math.abs(seed) % 2_147_483_646) + 1
  return items
    .map((item) => {
      state = (state * 48_271) % 2_147_483_647
      return { item, at: state }
    })
    .sort((left, right) => left.at - right.at)
    .map(({ item }) => item)
}

/** The exact amount of a line as a fraction, straight from the input: pool × Σ (ms × share) ÷ (Σ ms × 100 %). */
function exactLine(
  input: DistributionInput,
  distribution: Distribution,
  line: Distribution['lines'][number],
): { numerator: bigint; denominator: bigint } {
  const { minimumSeconds, capSecondsPerPlay } = input.rules
  let all = 0n
  let own = 0n
  for (const item of input.plays) {
    const lengthMs = Math.round(item.creditedSeconds * 1000)
    if (item.stationId !== line.stationId || lengthMs < minimumSeconds * 1000) continue
    const countedMs = BigInt(Math.min(lengthMs, (capSecondsPerPlay ?? Infinity) * 1000))
    all += countedMs
    const subjectId = line.right === 'works' ? item.workId : item.recordingId
    if (subjectId !== line.subjectId) continue
    const valid = input.shares.filter(
      (candidate) =>
        candidate.right === line.right &&
        candidate.subjectId === subjectId &&
        candidate.validFrom <= item.localDate &&
        (candidate.validTo ?? '9999-12-31') >= item.localDate,
    )
    const sharePpm = valid
      .filter(({ partyId }) => partyId === line.partyId)
      .reduce((sum, candidate) => sum + candidate.sharePpm, 0)
    const claimedPpm = valid.reduce((sum, candidate) => sum + candidate.sharePpm, 0)
    if (claimedPpm <= 1_000_000 && sharePpm === line.sharePpm) own += countedMs * BigInt(sharePpm)
  }
  const station = distribution.stations.find(({ stationId }) => stationId === line.stationId)
  const pool = station?.pools.find(({ right }) => right === line.right)
  return { numerator: (pool?.amountMinor ?? 0n) * own, denominator: all * 1_000_000n }
}
