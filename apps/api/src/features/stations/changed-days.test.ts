import { localDateSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { changedDays } from './changed-days.ts'
import type { LicenceTerms } from './stations.repository.ts'

function terms(from: string, to: string | null, fee = '1000'): LicenceTerms {
  return {
    validFrom: localDateSchema.parse(from),
    validTo: to === null ? null : localDateSchema.parse(to),
    monthlyFeeMinor: fee,
    worksPartPpm: 500_000,
  }
}

describe('changedDays', () => {
  it('is the whole licence when it is new or its price changes', () => {
    expect(changedDays(null, terms('2026-01-01', null))).toEqual([{ from: '2026-01-01', to: null }])
    expect(changedDays(terms('2026-01-01', null), terms('2026-01-01', null, '2000'))).toEqual([
      { from: '2026-01-01', to: null },
      { from: '2026-01-01', to: null },
    ])
  })

  it('is only the days cut off when a licence ends', () => {
    expect(changedDays(terms('2026-01-01', null), terms('2026-01-01', '2026-12-31'))).toEqual([
      { from: '2027-01-01', to: null },
    ])
  })

  it('is only the days added when a licence begins earlier and ends later', () => {
    expect(changedDays(terms('2026-03-01', '2026-03-31'), terms('2026-02-15', '2026-04-10'))).toEqual([
      { from: '2026-02-15', to: '2026-02-28' },
      { from: '2026-04-01', to: '2026-04-10' },
    ])
  })

  it('is both when a licence moves to days it never had', () => {
    expect(changedDays(terms('2026-01-01', '2026-01-31'), terms('2026-05-01', '2026-05-31'))).toEqual([
      { from: '2026-01-01', to: '2026-01-31' },
      { from: '2026-05-01', to: '2026-05-31' },
    ])
  })

  it('is nothing when nothing changes', () => {
    expect(changedDays(terms('2026-01-01', null), terms('2026-01-01', null))).toEqual([])
  })
})
