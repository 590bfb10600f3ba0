import { minorUnits } from '../currency/minor-units.ts'
import { WHOLE_PPM } from '../fees/apply-deductions.ts'
import { requireInput } from '../royalty-error.ts'
import { type DistributionInput, type LicenceInput, type PlayInput, type ShareInput } from './input.ts'

/** Identifiers are parts of the keys that settle ties, so they may not hold what separates those parts. */
const IDENTIFIER = /^[A-Za-z0-9_-]+$/
const DAY = /^\d{4}-\d{2}-\d{2}$/

/** @throws RoyaltyError `invalid-input` or `unknown-currency`, naming the first thing found wrong */
export function checkInput(input: DistributionInput): void {
  minorUnits(input.currency)
  requireInput(/^\d{4}-(0[1-9]|1[0-2])$/.test(input.month), `${input.month} is not a month.`)
  const { minimumSeconds, capSecondsPerPlay } = input.rules
  requireInput(isDuration(minimumSeconds), 'The minimum length of a play is not a duration.')
  requireInput(
    capSecondsPerPlay === null || (isDuration(capSecondsPerPlay) && capSecondsPerPlay > 0),
    'The cap on the length of a play is not a duration above zero.',
  )
  requireUnique(
    input.licences.map(({ stationId }) => stationId),
    'licence of station',
  )
  requireUnique(
    input.plays.map(({ playId }) => playId),
    'play',
  )
  for (const licence of input.licences) checkLicence(licence)
  for (const play of input.plays) checkPlay(play, input.month)
  for (const share of input.shares) checkShare(share)
}

function checkLicence(licence: LicenceInput): void {
  const { stationId, monthlyFeeMinor, worksPartPpm, heldSeconds, expectedSeconds } = licence
  requireIdentifier(stationId)
  requireInput(monthlyFeeMinor >= 0n, `The fee of station ${stationId} is negative.`)
  requireInput(
    Number.isInteger(worksPartPpm) && worksPartPpm >= 0 && worksPartPpm <= WHOLE_PPM,
    `The part for works of station ${stationId} lies outside 0 to 100 %.`,
  )
  requireInput(
    isDuration(heldSeconds) && isDuration(expectedSeconds),
    `The coverage of station ${stationId} is not a pair of durations.`,
  )
}

function checkPlay(play: PlayInput, month: string): void {
  for (const id of [play.playId, play.stationId, play.recordingId]) requireIdentifier(id)
  if (play.workId !== null) requireIdentifier(play.workId)
  requireInput(
    DAY.test(play.localDate) && play.localDate.startsWith(month),
    `Play ${play.playId} on ${play.localDate} lies outside the month ${month}.`,
  )
  requireInput(isDuration(play.creditedSeconds), `Play ${play.playId} has no length.`)
}

function checkShare(share: ShareInput): void {
  requireIdentifier(share.subjectId)
  requireIdentifier(share.partyId)
  requireInput(
    Number.isSafeInteger(share.sharePpm) && share.sharePpm >= 0,
    `A share of party ${share.partyId} in ${share.subjectId} is not a whole number of parts per million.`,
  )
  requireInput(
    DAY.test(share.validFrom) && (share.validTo === null || DAY.test(share.validTo)),
    `A share of party ${share.partyId} in ${share.subjectId} has no readable validity.`,
  )
}

function isDuration(seconds: number): boolean {
  return seconds >= 0 && Number.isSafeInteger(Math.round(seconds * 1000))
}

function requireIdentifier(id: string): void {
  requireInput(IDENTIFIER.test(id), `“${id}” is not an identifier.`)
}

function requireUnique(ids: readonly string[], what: string): void {
  const seen = new Set<string>()
  for (const id of ids) {
    requireInput(!seen.has(id), `The ${what} ${id} is given twice.`)
    seen.add(id)
  }
}
