import type { Detection } from '@fieldfare/fingerprint'
import type { Play } from '../corpus/index.ts'

/** How well a log was read: plays against detections. */
export type Score = {
  readonly plays: number
  readonly found: number
  readonly inPieces: number
  readonly speedsRight: number
  readonly airtimeShare: number
  readonly edgeErrors: readonly number[]
  readonly falseAccepted: number
  readonly falseReview: number
}

/** Moments of log and reference may disagree by this much for a detection to be of this play and not of a repeat. */
const SAME_PLAY_SECONDS = 3
const SPEED_TOLERANCE = 0.002

function isOf(detection: Detection, play: Play, numberOf: (track: string) => number): boolean {
  const expected = play.refStart + (detection.startSeconds - play.start) * play.speed
  return (
    detection.recordingNumber === numberOf(play.track) &&
    detection.startSeconds < play.end &&
    detection.endSeconds > play.start &&
    Math.abs(detection.referenceStartSeconds - expected) < SAME_PLAY_SECONDS
  )
}

export function scoreLog(
  plays: readonly Play[],
  detections: readonly Detection[],
  numberOf: (track: string) => number,
): Score {
  const used = new Set<Detection>()
  const edgeErrors: number[] = []
  let inPieces = 0
  let speedsRight = 0
  let airtime = 0
  let foundAirtime = 0
  let found = 0
  for (const play of plays) {
    const own = detections.filter((detection) => isOf(detection, play, numberOf))
    const [first] = own
    if (!first) continue
    found++
    for (const detection of own) used.add(detection)
    const start = Math.min(...own.map(({ startSeconds }) => startSeconds))
    const end = Math.max(...own.map(({ endSeconds }) => endSeconds))
    edgeErrors.push(Math.abs(start - play.start), Math.abs(end - play.end))
    airtime += play.end - play.start
    foundAirtime += Math.min(end, play.end) - Math.max(start, play.start)
    if (own.length > 1) inPieces++
    if (Math.abs(first.speedRatio / play.speed - 1) <= SPEED_TOLERANCE) speedsRight++
  }
  const others = detections.filter((detection) => !used.has(detection))
  const falseAccepted = others.filter(({ decision }) => decision === 'accept').length
  return {
    plays: plays.length,
    found,
    inPieces,
    speedsRight,
    airtimeShare: airtime === 0 ? 1 : foundAirtime / airtime,
    edgeErrors,
    falseAccepted,
    falseReview: others.length - falseAccepted,
  }
}

/** The value below which a share of the values lies. */
export function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? 0
}
