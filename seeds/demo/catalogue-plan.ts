import { ipiCheckDigits, iswcCheckDigit, type Right } from '@fieldfare/contracts'
import { performerName, producerNames, publisherNames, tuneTitle, writerNames } from './invented-names.ts'
import { createRandom } from './random.ts'

export const RECORDINGS = 60
const PERFORMERS = 14
/** Tunes from this seed on are played on air and are in nobody's catalogue. */
export const FIRST_UNKNOWN_TUNE = 900

export type PartyPlan = { key: string; name: string; ipi: string | null }
export type SharePlan = { right: Right; partyKey: string; sharePpm: number; validFromMonthsAgo: number }
export type WorkPlan = { title: string; creators: string; iswc: string | null; shares: SharePlan[] }
export type RecordingPlan = {
  isrc: string
  title: string
  artist: string
  tuneSeed: number
  workIndex: number | null
  shares: SharePlan[]
}
export type CataloguePlan = { parties: PartyPlan[]; works: WorkPlan[]; recordings: RecordingPlan[] }

/** US-S1Z is the prefix set aside for illustrations (DDEX), so no recording of anybody has this code. */
function demoIsrc(n: number): string {
  return `USS1Z26${String(n + 1).padStart(5, '0')}`
}

function demoIswc(n: number): string {
  const digits = `99900${String(n + 1).padStart(4, '0')}`
  return `T${digits}${iswcCheckDigit(digits)}`
}

function demoIpi(n: number): string {
  const digits = `0099${String(n + 1).padStart(5, '0')}`
  return `${digits}${ipiCheckDigits(digits)}`
}

function planParties(): PartyPlan[] {
  const named = [...writerNames, ...publisherNames, ...producerNames].map((name) => ({ key: name, name }))
  const performers = Array.from({ length: PERFORMERS }, (_, n) => ({
    key: performerName(n),
    name: performerName(n),
  }))
  return [...named, ...performers].map((party, n) => ({
    ...party,
    // One number with a wrong check and one party without: both happen, and the desk must see them.
    ipi: n === 3 ? '00990000499' : n === 20 ? null : demoIpi(n),
  }))
}

const always = 24

function planWork(n: number): WorkPlan {
  const random = createRandom(5000 + n)
  const first = random.pick(writerNames)
  const second = random.pick(writerNames.filter((name) => name !== first))
  const publisher = random.pick(publisherNames)
  const isDuo = random.chance(0.4)
  const share = (partyKey: string, sharePpm: number, validFromMonthsAgo = always): SharePlan => ({
    right: 'works',
    partyKey,
    sharePpm,
    validFromMonthsAgo,
  })
  const shares = isDuo
    ? [share(first, 333_333), share(second, 333_333), share(publisher, 333_334)]
    : [share(first, 500_000), share(publisher, 500_000)]
  return {
    title: tuneTitle(n),
    creators: isDuo ? `${first}, ${second}` : first,
    iswc: n % 11 === 7 ? null : demoIswc(n),
    // Unclaimed, partly claimed and claimed only since this month: what holdbacks are for.
    shares:
      n === 5
        ? []
        : n === 9
          ? shares.slice(0, -1)
          : n === 17
            ? shares.map((each) => ({ ...each, validFromMonthsAgo: 0 }))
            : shares,
  }
}

function planRecording(n: number, works: number): RecordingPlan {
  const performer = performerName(n % PERFORMERS)
  const producer = producerNames[n % producerNames.length] ?? producerNames[0]
  // The last recordings are new versions of earlier works; one has no work yet.
  const workIndex = n === 31 ? null : n % works
  return {
    isrc: demoIsrc(n),
    title: n >= works ? `${tuneTitle(n % works)} (evening version)` : tuneTitle(n),
    artist: performer,
    tuneSeed: n + 1,
    workIndex,
    shares: [
      { right: 'recordings', partyKey: producer, sharePpm: 500_000, validFromMonthsAgo: always },
      { right: 'recordings', partyKey: performer, sharePpm: 500_000, validFromMonthsAgo: always },
    ],
  }
}

/** The demo's catalogue: 60 recordings of 54 works, with the irregularities every catalogue has. */
export function planCatalogue(): CataloguePlan {
  const works = Array.from({ length: RECORDINGS - 6 }, (_, n) => planWork(n))
  return {
    parties: planParties(),
    works,
    recordings: Array.from({ length: RECORDINGS }, (_, n) => planRecording(n, works.length)),
  }
}
