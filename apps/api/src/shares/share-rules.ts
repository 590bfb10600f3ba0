import { shareTotalsByPeriod, type FieldError, type SharePeriodTotal } from '@fieldfare/contracts'

export const WHOLE_PPM = 1_000_000

export type ShareTerms = { partyId: string; sharePpm: number; validFrom: string; validTo: string | null }

/** 125,000 → 12.5: exact, since a part per million is a ten-thousandth of a per cent. */
export function percentText(ppm: number): string {
  const fraction = String(ppm % 10_000)
    .padStart(4, '0')
    .replace(/0+$/, '')
  const whole = Math.floor(ppm / 10_000)
  return fraction === '' ? String(whole) : `${whole}.${fraction}`
}

export function periodText({ from, to }: { from: string; to: string | null }): string {
  if (to === null) return `from ${from} on`
  return from === to ? `on ${from}` : `from ${from} to ${to}`
}

/** Stretches of days on which more than the whole is claimed. */
export function overclaimedPeriods(shares: readonly ShareTerms[]): SharePeriodTotal[] {
  return shareTotalsByPeriod(shares).filter(({ totalPpm }) => totalPpm > WHOLE_PPM)
}

/** Stretches of days, from the first share on, on which less than the whole is claimed. */
export function underclaimedPeriods(shares: readonly ShareTerms[]): SharePeriodTotal[] {
  return shareTotalsByPeriod(shares).filter(({ totalPpm }) => totalPpm < WHOLE_PPM)
}

export function overclaimText(periods: readonly SharePeriodTotal[]): string {
  const parts = periods.map((period) => `${percentText(period.totalPpm)} % ${periodText(period)}`)
  return `The shares come to more than 100 %: ${parts.join('; ')}.`
}

export function underclaimText(periods: readonly SharePeriodTotal[]): string {
  const parts = periods.map(
    (period) =>
      `${percentText(WHOLE_PPM - period.totalPpm)} % ${periodText(period)} (claimed: ${percentText(period.totalPpm)} %)`,
  )
  return `The shares come to less than 100 %; held back will be ${parts.join('; ')}.`
}

/** Pairs of shares, by index, with which one party would hold two shares on one day. */
export function doubledParties(shares: readonly ShareTerms[]): { index: number; earlierIndex: number }[] {
  return shares.flatMap((share, index) => {
    const earlierIndex = shares.findIndex(
      (other, at) => at < index && other.partyId === share.partyId && overlaps(other, share),
    )
    return earlierIndex < 0 ? [] : [{ index, earlierIndex }]
  })
}

function overlaps(left: ShareTerms, right: ShareTerms): boolean {
  return (
    (left.validTo === null || right.validFrom <= left.validTo) &&
    (right.validTo === null || left.validFrom <= right.validTo)
  )
}

/** What speaks against replacing the shares of one work or recording by these. */
export function shareComplaints(shares: readonly ShareTerms[], acceptIncomplete: boolean): FieldError[] {
  const doubled = doubledParties(shares).map(({ index, earlierIndex }) => ({
    path: `shares.${index}.partyId`,
    message: `This party holds share ${earlierIndex + 1} on some of the same days. Give one share, or let the days not overlap.`,
  }))
  if (doubled.length > 0) return doubled
  const over = overclaimedPeriods(shares)
  if (over.length > 0) return [{ path: 'shares', message: overclaimText(over) }]
  if (acceptIncomplete) return []
  if (shares.length === 0) {
    return [
      { path: 'shares', message: 'Without any share everything will be held back. Accept this to go on.' },
    ]
  }
  const under = underclaimedPeriods(shares)
  return under.length === 0
    ? []
    : [{ path: 'shares', message: `${underclaimText(under)} Accept this to go on.` }]
}
