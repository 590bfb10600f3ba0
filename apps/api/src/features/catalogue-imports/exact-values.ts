/** A value of a cell, or words about what is wrong with it. */
export type Reading<Value> = { ok: true; value: Value } | { ok: false; message: string }

const refused = (message: string): Reading<never> => ({ ok: false, message })

/** 12.5 or 12,5, with or without a per cent sign, to parts per million; the figures are moved, never multiplied. */
export function readPercent(cell: string): Reading<number> {
  const match = /^(\d{1,3})(?:[.,](\d+))?\s*%?$/.exec(cell)
  if (match === null) return refused(`The share “${cell}” is not a percentage such as 12.5.`)
  const [, whole = '', decimals = ''] = match
  const significant = decimals.replace(/0+$/, '')
  if (significant.length > 4) return refused(`The share “${cell}” has more than four decimals.`)
  const ppm = Number(`${whole}${significant.padEnd(4, '0')}`)
  if (ppm < 1 || ppm > 1_000_000) return refused(`The share “${cell}” is not above 0 and up to 100 %.`)
  return { ok: true, value: ppm }
}

/** 3:45, 1:02:03 or seconds such as 225 or 225,5, to whole milliseconds. */
export function readDuration(cell: string): Reading<number> {
  const match = /^(?:(?:(\d{1,2}):)?(\d{1,2}):)?(\d{1,5})(?:[.,](\d{1,3}))?$/.exec(cell)
  if (match === null)
    return refused(`The duration “${cell}” is neither minutes and seconds (3:45) nor seconds (225.5).`)
  const [, hours = '0', minutes, seconds = '0', decimals = ''] = match
  const isClock = minutes !== undefined
  if (isClock && (Number(seconds) > 59 || (match[1] !== undefined && Number(minutes) > 59))) {
    return refused(`The duration “${cell}” has more than 59 minutes or seconds.`)
  }
  const wholeSeconds = Number(hours) * 3600 + Number(minutes ?? '0') * 60 + Number(seconds)
  const milliseconds = wholeSeconds * 1000 + Number(decimals.padEnd(3, '0'))
  if (milliseconds < 1 || milliseconds > 86_400_000)
    return refused(`The duration “${cell}” is not between 0 and 24 hours.`)
  return { ok: true, value: milliseconds }
}
