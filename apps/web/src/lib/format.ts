const MINUS = '\u2212'
const NARROW_SPACE = '\u202f'
const NO_BREAK_SPACE = '\u00a0'

const counts = new Intl.NumberFormat('en-GB')

export function formatCount(count: number): string {
  return counts.format(count).replace('-', MINUS)
}

/** Seconds as m:ss, whole seconds, cut and not rounded so that a play never shows more than it has. */
export function formatDuration(seconds: number): string {
  const whole = Math.floor(Math.abs(seconds))
  const text = `${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, '0')}`
  return seconds < 0 && whole > 0 ? `${MINUS}${text}` : text
}

/** Long airtime in words: 12 h 34 min. */
export function formatHours(seconds: number): string {
  const minutes = Math.floor(seconds / 60)
  if (minutes < 60) return `${minutes}${NO_BREAK_SPACE}min`
  return `${formatCount(Math.floor(minutes / 60))}${NO_BREAK_SPACE}h ${minutes % 60}${NO_BREAK_SPACE}min`
}

/** How long something still takes, coarse on purpose: an estimate to the second would be a false promise. */
export function formatRemaining(seconds: number): string {
  if (seconds < 5) return 'a few seconds'
  if (seconds < 60) return `${Math.ceil(seconds / 5) * 5} seconds`
  if (seconds < 3600) {
    const minutes = Math.ceil(seconds / 60)
    return minutes === 1 ? '1 minute' : `${minutes} minutes`
  }
  return formatHours(seconds)
}

export function formatPpm(partsPerMillion: number, decimals = 2): string {
  return formatRatio(partsPerMillion / 1_000_000, decimals)
}

export function formatRatio(ratio: number, decimals = 1): string {
  const text = new Intl.NumberFormat('en-GB', { maximumFractionDigits: decimals }).format(ratio * 100)
  return `${text.replace('-', MINUS)}${NARROW_SPACE}%`
}

const byteUnits = ['bytes', 'kB', 'MB', 'GB', 'TB'] as const

/** Decimal multiples (SI), as file managers and disks state them. */
export function formatBytes(bytes: number): string {
  let amount = bytes
  let index = 0
  while (amount >= 1000 && index < byteUnits.length - 1) {
    amount /= 1000
    index += 1
  }
  const digits = index === 0 || amount >= 100 ? 0 : 1
  return `${amount.toFixed(digits)}${NO_BREAK_SPACE}${byteUnits[index] ?? ''}`
}
