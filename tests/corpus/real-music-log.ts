import type { MusicTrack } from './debian-music.ts'
import { airBroadcast, type Item, type Play } from './broadcast.ts'
import { CORPUS_RATE_HZ, decodeSamples, levelled, writeMp3 } from './samples.ts'

/** One piece to play: from `fromSeconds` of the reference, for at most `seconds`. */
export type ScheduledTrack = {
  readonly track: MusicTrack
  readonly fromSeconds?: number
  readonly seconds?: number
  /** Unknown music is played but not listed among the plays. */
  readonly isUnknown?: boolean
}

export type RealMusicLogOptions = {
  readonly tracks: readonly ScheduledTrack[]
  /** Where the MP3 goes. */
  readonly path: string
  readonly crossfadeSeconds?: number
  readonly bitRate?: string
}

/** `track` of a play is the name of the piece. */
export type RealMusicLog = {
  readonly path: string
  readonly seconds: number
  readonly plays: readonly Play[]
}

async function scheduledItem({ track, fromSeconds = 0, seconds, isUnknown }: ScheduledTrack): Promise<Item> {
  const whole = levelled(await decodeSamples(track.path))
  const from = Math.round(fromSeconds * CORPUS_RATE_HZ)
  const to = seconds === undefined ? whole.length : from + Math.round(seconds * CORPUS_RATE_HZ)
  const samples = whole.slice(from, to)
  return isUnknown ? { samples } : { samples, track: track.name, refStart: fromSeconds }
}

/** Plays the pieces with crossfades, as one MP3 (64 kbit/s unless told otherwise), and says what was played when. */
export async function buildRealMusicLog(options: RealMusicLogOptions): Promise<RealMusicLog> {
  const { tracks, path, crossfadeSeconds = 2, bitRate = '64k' } = options
  const items: Item[] = []
  for (const scheduled of tracks) items.push(await scheduledItem(scheduled))
  const { samples, seconds, plays } = airBroadcast(items, crossfadeSeconds)
  await writeMp3(samples, path, { bitRate })
  return { path, seconds, plays }
}
