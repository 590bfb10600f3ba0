import { describe, expect, it } from 'vitest'
import {
  percentText,
  shareComplaints,
  underclaimText,
  underclaimedPeriods,
  type ShareTerms,
} from './share-rules.ts'

function share(
  partyId: string,
  percent: number,
  validFrom = '2026-01-01',
  validTo: string | null = null,
): ShareTerms {
  return { partyId, sharePpm: percent * 10_000, validFrom, validTo }
}

describe('percentText', () => {
  it('is exact to the part per million', () => {
    expect([1, 125_000, 333_333, 1_000_000, 500_000].map(percentText)).toEqual([
      '0.0001',
      '12.5',
      '33.3333',
      '100',
      '50',
    ])
  })
})

describe('shareComplaints', () => {
  it('has none for shares that make a whole on every day', () => {
    expect(
      shareComplaints(
        [share('a', 50, '2026-01-01', '2026-06-30'), share('b', 50), share('c', 50, '2026-07-01')],
        false,
      ),
    ).toEqual([])
  })

  it('names the days and the sum where more than the whole is claimed, accepted or not', () => {
    const complaints = shareComplaints(
      [share('a', 60), share('b', 40), share('c', 0.5, '2026-03-01', '2026-03-31')],
      true,
    )
    expect(complaints).toEqual([
      {
        path: 'shares',
        message: 'The shares come to more than 100 %: 100.5 % from 2026-03-01 to 2026-03-31.',
      },
    ])
  })

  it('tells what will be held back, until that is accepted', () => {
    const shares = [share('a', 62.5)]
    expect(shareComplaints(shares, false)).toEqual([
      {
        path: 'shares',
        message:
          'The shares come to less than 100 %; held back will be 37.5 % from 2026-01-01 on (claimed: 62.5 %). Accept this to go on.',
      },
    ])
    expect(shareComplaints(shares, true)).toEqual([])
  })

  it('asks before everything is held back', () => {
    expect(shareComplaints([], false)).toHaveLength(1)
    expect(shareComplaints([], true)).toEqual([])
  })

  it('refuses one party twice on one day, and not one after the other', () => {
    expect(
      shareComplaints([share('a', 50), share('a', 50, '2026-05-01')], false).map(({ path }) => path),
    ).toEqual(['shares.1.partyId'])
    expect(
      shareComplaints([share('a', 100, '2026-01-01', '2026-04-30'), share('a', 100, '2026-05-01')], false),
    ).toEqual([])
  })
})

describe('underclaimedPeriods', () => {
  it('finds a gap between two shares', () => {
    const shares = [share('a', 100, '2026-01-01', '2026-01-31'), share('a', 100, '2026-02-02')]
    expect(underclaimText(underclaimedPeriods(shares))).toContain('100 % on 2026-02-01 (claimed: 0 %)')
  })
})
