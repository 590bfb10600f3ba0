import { compareText } from '../compare-text.ts'
import { WHOLE_PPM } from '../fees/apply-deductions.ts'
import { groupBy } from '../group-by.ts'
import { type HoldbackReason } from './distribution.ts'
import { type Right, type ShareInput } from './input.ts'

/** A party's part of what a play earned. */
export type PartyPart = { readonly kind: 'party'; readonly partyId: string; readonly ppm: number }

/** The part of what a play earned that is kept apart. */
export type HoldbackPart = {
  readonly kind: 'holdback'
  readonly reason: HoldbackReason
  readonly ppm: number
  readonly claimantPartyIds: readonly string[]
}

/** One part of what a play earned. The parts of a play come to exactly 100 %. */
export type Part = PartyPart | HoldbackPart

/** Answers how what a subject earned on a day is divided. */
export type ShareTerms = (subjectId: string, localDate: string) => readonly Part[]

/** Looks up the shares of one right by subject and day; each answer is worked out once. */
export function shareTermsFor(right: Right, shares: readonly ShareInput[]): ShareTerms {
  const bySubject = groupBy(
    shares.filter((share) => share.right === right && share.sharePpm > 0),
    ({ subjectId }) => subjectId,
  )
  const known = new Map<string, readonly Part[]>()
  return (subjectId, localDate) => {
    const key = `${subjectId} ${localDate}`
    const found = known.get(key)
    if (found) return found
    const parts = partsOn(localDate, bySubject.get(subjectId) ?? [])
    known.set(key, parts)
    return parts
  }
}

function partsOn(localDate: string, recorded: readonly ShareInput[]): readonly Part[] {
  if (recorded.length === 0) return [wholeHeld('no-shares', [])]
  const valid = recorded.filter(
    ({ validFrom, validTo }) => validFrom <= localDate && (validTo === null || localDate <= validTo),
  )
  if (valid.length === 0) return [wholeHeld('no-valid-share', recorded)]
  const claimedPpm = valid.reduce((sum, { sharePpm }) => sum + sharePpm, 0)
  if (claimedPpm > WHOLE_PPM) return [wholeHeld('shares-over-claimed', valid)]
  const parts: Part[] = partiesOf(valid).map((partyId) => ({
    kind: 'party',
    partyId,
    // A party may hold several shares of a subject, as its composer and as its publisher for instance.
    ppm: valid.reduce((sum, share) => (share.partyId === partyId ? sum + share.sharePpm : sum), 0),
  }))
  if (claimedPpm < WHOLE_PPM) {
    parts.push({ ...wholeHeld('shares-incomplete', valid), ppm: WHOLE_PPM - claimedPpm })
  }
  return parts
}

function wholeHeld(reason: HoldbackReason, shares: readonly ShareInput[]): HoldbackPart {
  return { kind: 'holdback', reason, ppm: WHOLE_PPM, claimantPartyIds: partiesOf(shares) }
}

function partiesOf(shares: readonly ShareInput[]): string[] {
  return [...new Set(shares.map(({ partyId }) => partyId))].sort(compareText)
}
