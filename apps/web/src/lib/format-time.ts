type Precision = 'day' | 'minute' | 'second'

const formatters = new Map<string, Intl.DateTimeFormat>()

function formatterFor(key: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const known = formatters.get(key)
  if (known !== undefined) return known
  const made = new Intl.DateTimeFormat('en-GB', options)
  formatters.set(key, made)
  return made
}

const dateShape = { day: 'numeric', month: 'short', year: 'numeric' } as const

export function formatLocalDate(instant: string, timeZone: string): string {
  return formatterFor(`date ${timeZone}`, { ...dateShape, timeZone }).format(new Date(instant))
}

/** Wall-clock time in a zone, 24 hours. */
export function formatClock(
  instant: string | number,
  timeZone: string,
  precision: 'minute' | 'second',
): string {
  const options: Intl.DateTimeFormatOptions = {
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone,
    ...(precision === 'second' ? { second: '2-digit' } : {}),
  }
  return formatterFor(`clock ${precision} ${timeZone}`, options).format(new Date(instant))
}

/** Short zone name at that moment: CET, WEST or GMT-3. */
export function formatZone(instant: string, timeZone: string): string {
  const parts = formatterFor(`zone ${timeZone}`, { timeZone, timeZoneName: 'short' }).formatToParts(
    new Date(instant),
  )
  return parts.find((part) => part.type === 'timeZoneName')?.value ?? timeZone
}

export function formatInstant(instant: string, timeZone: string, precision: Precision = 'minute'): string {
  const date = formatLocalDate(instant, timeZone)
  return precision === 'day' ? date : `${date}, ${formatClock(instant, timeZone, precision)}`
}

/** A calendar day without a zone, '2026-11-29', as people read it: Sun 29 Nov 2026. */
export function formatDay(day: string): string {
  return formatterFor('day UTC', { ...dateShape, weekday: 'short', timeZone: 'UTC' }).format(
    new Date(`${day}T00:00:00Z`),
  )
}

/** A day within a month that is named elsewhere: Sun 29. */
export function formatShortDay(day: string): string {
  return formatterFor('short day UTC', { weekday: 'short', day: 'numeric', timeZone: 'UTC' }).format(
    new Date(`${day}T00:00:00Z`),
  )
}

/** A month, '2026-11', as people read it: November 2026. */
export function formatMonth(month: string): string {
  return formatterFor('month UTC', { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(
    new Date(`${month}-01T00:00:00Z`),
  )
}

/** The month before or after, by whole months. */
export function shiftMonth(month: string, count: number): string {
  const [year = 0, number = 1] = month.split('-').map(Number)
  return new Date(Date.UTC(year, number - 1 + count, 1)).toISOString().slice(0, 7)
}

/** The current month in a zone. */
export function currentMonth(timeZone: string, now = new Date()): string {
  const parts = formatterFor(`month ${timeZone}`, {
    year: 'numeric',
    month: '2-digit',
    timeZone,
  }).formatToParts(now)
  const part = (type: string) => parts.find((candidate) => candidate.type === type)?.value ?? ''
  return `${part('year')}-${part('month')}`
}
