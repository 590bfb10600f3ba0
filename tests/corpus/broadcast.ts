import { CORPUS_RATE_HZ, type Samples } from './samples.ts'

/** One thing on air. Without a track it is speech, noise or music that no catalogue holds. */
export type Item = {
  readonly samples: Samples
  readonly track?: string
  /** Second of the reference at which it starts. */
  readonly refStart?: number
  /** Above 1 it runs fast. */
  readonly speed?: number
}

/** What was really played. Times in seconds of the log. */
export type Play = {
  readonly track: string
  readonly start: number
  readonly end: number
  readonly refStart: number
  readonly speed: number
}

export type Broadcast = {
  readonly samples: Samples
  readonly seconds: number
  readonly plays: readonly Play[]
}

function fadeGain(position: number, length: number, fade: number): number {
  return Math.max(0, Math.min(1, (position + 1) / (fade + 1), (length - position) / (fade + 1)))
}

/** Plays items one after another; each fades into the next over `crossfadeSeconds` (straight lines, as a desk does). */
export function airBroadcast(items: readonly Item[], crossfadeSeconds = 0): Broadcast {
  const fade = Math.round(crossfadeSeconds * CORPUS_RATE_HZ)
  const total = items.reduce((sum, { samples }) => sum + Math.max(0, samples.length - fade), fade)
  const log = new Float32Array(total)
  const plays: Play[] = []
  let at = 0
  for (const { samples, track, refStart = 0, speed = 1 } of items) {
    for (let i = 0; i < samples.length; i++) {
      const gain = fade === 0 ? 1 : fadeGain(i, samples.length, fade)
      log[at + i] = (log[at + i] ?? 0) + gain * (samples[i] ?? 0)
    }
    const start = at / CORPUS_RATE_HZ
    if (track) plays.push({ track, start, end: start + samples.length / CORPUS_RATE_HZ, refStart, speed })
    at += samples.length - fade
  }
  return { samples: log, seconds: total / CORPUS_RATE_HZ, plays }
}
