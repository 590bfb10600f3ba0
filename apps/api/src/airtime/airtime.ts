import type { AirtimeKind, AirtimeSpan } from '@fieldfare/contracts'
import type { z } from 'zod'
import type { airtimeSpanSchema } from '@fieldfare/contracts'
import type { Connection } from '@fieldfare/database'
import {
  listCountedPlays,
  listHeard,
  listHeld,
  listWaitingDetections,
  type AirtimeRange,
  type FoundSpan,
  type HeardSpan,
  type HeldSpan,
  type PlayedSpan,
} from './airtime.repository.ts'
import { clipAll, coveredSeconds, subtract, type Interval } from './intervals.ts'

/** Shorter stretches between two plays are fades and announcements over music, not something to look for. */
export const UNIDENTIFIED_MINIMUM_MS = 10_000

/** All that is known of a stretch of a station's airtime, cut to it. */
export type Airtime = {
  held: HeldSpan[]
  heard: HeardSpan[]
  plays: PlayedSpan[]
  waiting: FoundSpan[]
}

/** Four queries, however long the range. The caller has checked that the station is in scope. */
export async function readAirtime(connection: Connection, range: AirtimeRange): Promise<Airtime> {
  const [held, heard, plays, waiting] = await Promise.all([
    listHeld(connection, range),
    listHeard(connection, range),
    listCountedPlays(connection, range),
    listWaitingDetections(connection, range),
  ])
  return clipAirtime({ held, heard, plays, waiting }, range)
}

export function clipAirtime(airtime: Airtime, bounds: Interval): Airtime {
  return {
    held: clipAll(airtime.held, bounds),
    heard: clipAll(airtime.heard, bounds),
    plays: clipAll(airtime.plays, bounds),
    waiting: clipAll(airtime.waiting, bounds),
  }
}

/** Music that no counted play and no detection waiting for review accounts for. */
export function unidentifiedMusic(airtime: Airtime): Interval[] {
  const music = airtime.heard.filter(({ kind }) => kind === 'music')
  return subtract(music, [...airtime.plays, ...airtime.waiting]).filter(
    ({ fromMs, toMs }) => toMs - fromMs >= UNIDENTIFIED_MINIMUM_MS,
  )
}

export function airtimeTotals(airtime: Airtime): {
  heldSeconds: number
  musicSeconds: number
  identifiedSeconds: number
} {
  return {
    heldSeconds: coveredSeconds(airtime.held),
    musicSeconds: coveredSeconds(airtime.heard.filter(({ kind }) => kind === 'music')),
    identifiedSeconds: coveredSeconds(airtime.plays),
  }
}

/** Spans by kind, in the order of a ribbon's layers. */
export function intervalsByKind(airtime: Airtime): [AirtimeKind, Interval[]][] {
  const heard = (kind: HeardSpan['kind']) => airtime.heard.filter((span) => span.kind === kind)
  return [
    ['held', airtime.held],
    ['silence', heard('silence')],
    ['speech', heard('speech')],
    ['music', heard('music')],
    ['unidentified', unidentifiedMusic(airtime)],
    ['review', airtime.waiting],
    ['play', airtime.plays],
  ]
}

type SpanDetails = Partial<Pick<AirtimeSpan, 'label' | 'logId' | 'detectionId' | 'playId'>>

function toSpan(
  kind: AirtimeKind,
  { fromMs, toMs }: Interval,
  details: SpanDetails = {},
): z.input<typeof airtimeSpanSchema> {
  return {
    kind,
    from: new Date(fromMs).toISOString(),
    to: new Date(toMs).toISOString(),
    label: details.label ?? null,
    logId: details.logId ?? null,
    detectionId: details.detectionId ?? null,
    playId: details.playId ?? null,
  }
}

/** The same as the wire has it, each span leading to its log, detection and play. */
export function presentSpans(airtime: Airtime): z.input<typeof airtimeSpanSchema>[] {
  return [
    ...airtime.held.map((span) => toSpan('held', span, { logId: span.logId })),
    ...airtime.heard.map((span) => toSpan(span.kind, span, { logId: span.logId })),
    ...unidentifiedMusic(airtime).map((span) => toSpan('unidentified', span)),
    ...airtime.waiting.map((span) =>
      toSpan('review', span, { label: span.label, logId: span.logId, detectionId: span.detectionId }),
    ),
    ...airtime.plays.map((span) =>
      toSpan('play', span, {
        label: span.label,
        logId: span.logId,
        detectionId: span.detectionId,
        playId: span.playId,
      }),
    ),
  ]
}
