import { describe, expect, it } from 'vitest'
import { shareTotalsByPeriod } from './shares.ts'

const share = (sharePpm: number, validFrom: string, validTo: string | null) => ({
  sharePpm,
  validFrom,
  validTo,
})

describe('shareTotalsByPeriod', () => {
  it('sums open-ended shares from their common start', () => {
    expect(
      shareTotalsByPeriod([share(600_000, '2026-01-01', null), share(400_000, '2026-01-01', null)]),
    ).toEqual([{ from: '2026-01-01', to: null, totalPpm: 1_000_000 }])
  })

  it('shows the days on which a hand-over leaves a hole', () => {
    const totals = shareTotalsByPeriod([
      share(1_000_000, '2026-01-01', '2026-06-29'),
      share(1_000_000, '2026-07-01', null),
    ])
    expect(totals).toEqual([
      { from: '2026-01-01', to: '2026-06-29', totalPpm: 1_000_000 },
      { from: '2026-06-30', to: '2026-06-30', totalPpm: 0 },
      { from: '2026-07-01', to: null, totalPpm: 1_000_000 },
    ])
  })

  it('shows the days claimed twice', () => {
    const totals = shareTotalsByPeriod([
      share(700_000, '2026-01-01', '2026-03-31'),
      share(700_000, '2026-03-01', '2026-12-31'),
    ])
    expect(totals.map((period) => period.totalPpm)).toEqual([700_000, 1_400_000, 700_000])
  })

  it('counts a leap day', () => {
    expect(shareTotalsByPeriod([share(1, '2028-02-29', '2028-02-29'), share(2, '2028-03-01', null)])).toEqual(
      [
        { from: '2028-02-29', to: '2028-02-29', totalPpm: 1 },
        { from: '2028-03-01', to: null, totalPpm: 2 },
      ],
    )
  })

  it('gives nothing for no shares', () => {
    expect(shareTotalsByPeriod([])).toEqual([])
  })
})
