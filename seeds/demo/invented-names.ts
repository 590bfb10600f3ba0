/** Everything here is invented; no station, artist, title or company of this name is meant. */
export const SOCIETY_NAME = 'Heron Sound Rights Society'

export const stationPlans = [
  {
    callName: 'SALT',
    talkSeconds: [600, 1700],
    name: 'Saltglass Radio',
    timeZone: 'Europe/Lisbon',
    monthlyFeeMinor: 1_480_000n,
    worksPartPpm: 600_000,
  },
  {
    callName: 'ROPE',
    talkSeconds: [900, 2600],
    name: 'Ropewalk Nine',
    timeZone: 'Europe/Lisbon',
    monthlyFeeMinor: 925_050n,
    worksPartPpm: 600_000,
  },
  {
    callName: 'FOGB',
    talkSeconds: [1500, 4200],
    name: 'Fogbell Public Radio',
    timeZone: 'Atlantic/Azores',
    monthlyFeeMinor: 640_000n,
    worksPartPpm: 550_000,
  },
  {
    callName: 'WIND',
    talkSeconds: [1000, 3400],
    name: 'Windrow Island Radio',
    timeZone: 'Atlantic/Azores',
    monthlyFeeMinor: 312_499n,
    worksPartPpm: 550_000,
  },
] as const

export const writerNames = [
  'Ottoline Varga-Reed',
  'Tobiah Merrowin',
  'Isaura Quillfeather',
  'Casimir Dovewater',
  'Petra Lundwyn',
  'Amadeu Fontclare',
  'Rosalind Tarnbeck',
  'Evander Sallowby',
  'Marit Hollenquist',
  'Joaquim Vellastro',
  'Winifred Oakhanger',
  'Lazlo Brightmere',
] as const

export const publisherNames = [
  'Millrace Editions',
  'Copperleaf Song Press',
  'Blue Lintel Music',
  'Tidewrack Publishing',
  'Nine Lanterns Editions',
] as const

export const producerNames = [
  'Cloudberry Recordings',
  'Slow Harbour Sound',
  'Attic Window Records',
  'Ferrystone Audio',
] as const

const performerFirst = [
  'The Tin',
  'Velvet',
  'Paper',
  'Northern',
  'Little',
  'Sunday',
  'Hollow',
  'Amber',
  'Static',
  'Glass',
] as const
const performerSecond = [
  'Orchards',
  'Ferrymen',
  'Almanac',
  'Kites',
  'Quarry',
  'Lamplighters',
  'Meridians',
  'Wrens',
] as const

const titleFirst = [
  'Lighthouse',
  'Paper',
  'Slow',
  'Copper',
  'Winter',
  'Borrowed',
  'Seven',
  'Saltwater',
  'Hidden',
  'Morning',
  'Velvet',
  'Broken',
  'Distant',
  'Small',
  'Midnight',
  'Gentle',
] as const
const titleSecond = [
  'Harbour',
  'Letters',
  'Carousel',
  'Bicycle',
  'Garden',
  'Satellite',
  'Umbrella',
  'Staircase',
  'Orchard',
  'Railway',
  'Telephone',
  'Weather',
  'Compass',
] as const

/** The name of performer or title number `n`: every number its own until the combinations run out. */
export function performerName(n: number): string {
  return `${performerFirst[n % performerFirst.length] ?? ''} ${performerSecond[(n * 3 + Math.floor(n / 40)) % performerSecond.length] ?? ''}`
}

export function tuneTitle(n: number): string {
  return `${titleFirst[n % titleFirst.length] ?? ''} ${titleSecond[n % titleSecond.length] ?? ''}`
}

/** What the announcers of the generated logs say. */
export const announcements = [
  'Good morning, and thank you for waking up with us. The wind is light, the ferries are running, and there is music on the way.',
  'That was our record of the week. Stay with us for the tide tables, and after that a conversation about old clocks.',
  'It is half past the hour. The library is open until seven tonight, and the market moves to the square on Saturday.',
  'You are listening to a programme made by people who like quiet mornings. Here is something new that arrived yesterday.',
  'The harbour road stays closed for repairs. Please take the upper bridge, and drive slowly past the school.',
  'Before the next piece, a letter from a listener who asks for it every spring and never tells us why.',
] as const
