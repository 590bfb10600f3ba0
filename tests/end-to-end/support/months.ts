import { STATION_OFFSET } from './desk.ts'

const HOUR_MS = 3_600_000

export type Months = {
  /** The last month that is over at the station. */
  closing: string
  /** The month after it, in which plays still change. */
  open: string
}

function shiftMonth(month: string, count: number): string {
  const [year = 0, number = 1] = month.split('-').map(Number)
  return new Date(Date.UTC(year, number - 1 + count, 1)).toISOString().slice(0, 7)
}

/**
 * The two months of the story. Four hours after midnight in UTC a new month has begun at the station too; until then
 * the story plays a month earlier.
 */
export function monthsOfStory(now = new Date()): Months {
  const open = new Date(now.getTime() - 4 * HOUR_MS).toISOString().slice(0, 7)
  return { closing: shiftMonth(open, -1), open }
}

/** As pages write a month: November 2026. */
export function monthInWords(month: string): string {
  return new Date(`${month}-01T00:00:00Z`).toLocaleDateString('en-GB', {
    month: 'long',
    year: 'numeric',
    timeZone: 'UTC',
  })
}

/** The moment at which the station's clock showed this. */
export function momentAt(local: string, secondsLater = 0): Date {
  return new Date(Date.parse(`${local}${STATION_OFFSET}`) + secondsLater * 1000)
}

/** The station's clock some seconds after a local time: 09:31:05. */
export function clockAt(local: string, secondsLater: number): string {
  return new Date(Date.parse(`${local}Z`) + Math.floor(secondsLater) * 1000).toISOString().slice(11, 19)
}
