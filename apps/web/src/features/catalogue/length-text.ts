/** A length as typed, 3:45 or 1:02:03 or seconds such as 225.5, to seconds; null where it is none. */
export function lengthToSeconds(text: string): number | null {
  const match = /^(?:(?:(\d{1,2}):)?(\d{1,3}):)?(\d{1,5}(?:\.\d{1,3})?)$/.exec(text.trim())
  if (match === null) return null
  const [, hours, minutes, seconds = '0'] = match
  if (minutes !== undefined && Number(seconds) >= 60) return null
  if (hours !== undefined && Number(minutes) >= 60) return null
  return Number(hours ?? 0) * 3600 + Number(minutes ?? 0) * 60 + Number(seconds)
}

/** 225.5 seconds as 3:45.5, without loss down to the millisecond. */
export function secondsToLength(seconds: number): string {
  const milliseconds = Math.round(seconds * 1000)
  const whole = Math.floor(milliseconds / 1000)
  const rest = String(milliseconds % 1000)
    .padStart(3, '0')
    .replace(/0+$/, '')
  const clock = `${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, '0')}`
  return rest === '' ? clock : `${clock}.${rest}`
}
