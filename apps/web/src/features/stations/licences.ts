import type { LicenceView } from '@fieldfare/contracts'

/** The licence in force on a day, or null. Days are compared as text: YYYY-MM-DD sorts as time does. */
export function licenceOn(licences: readonly LicenceView[], day: string): LicenceView | null {
  return (
    licences.find(({ validFrom, validTo }) => day >= validFrom && (validTo === null || day <= validTo)) ??
    null
  )
}

/** Today's date on a station's calendar. */
export function todayIn(timeZone: string, now = new Date()): string {
  return new Intl.DateTimeFormat('en-CA', { timeZone }).format(now)
}
