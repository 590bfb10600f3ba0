/** Parts per million in the whole. */
export const WHOLE_PPM = 1_000_000

/** A percentage as typed, 12.5 or 12,5 with or without the sign, to parts per million; null where it is none. */
export function percentToPpm(text: string): number | null {
  const match = /^(\d{1,3})(?:[.,](\d+))?\s*%?$/.exec(text.trim())
  if (match === null) return null
  const [, whole = '', decimals = ''] = match
  const significant = decimals.replace(/0+$/, '')
  if (significant.length > 4) return null
  // The figures are moved, never multiplied: 33.3333 must not become 333332.99….
  const ppm = Number(`${whole}${significant.padEnd(4, '0')}`)
  return ppm > WHOLE_PPM ? null : ppm
}

/** 125,000 parts per million as 12.5, exactly. */
export function ppmToPercent(ppm: number): string {
  const fraction = String(ppm % 10_000)
    .padStart(4, '0')
    .replace(/0+$/, '')
  const whole = String(Math.floor(ppm / 10_000))
  return fraction === '' ? whole : `${whole}.${fraction}`
}
