import { describe, expect, it } from 'vitest'
import css from './theme.css?raw'

function readTokens(mode: 'light' | 'dark'): Map<string, string> {
  const pattern = /--color-([a-z-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\)/g
  return new Map(
    Array.from(css.matchAll(pattern), ([, name = '', light = '', dark = '']) => [
      name,
      mode === 'light' ? light : dark,
    ]),
  )
}

/** Relative luminance, WCAG 2.2 (https://www.w3.org/TR/WCAG22/#dfn-relative-luminance). */
function relativeLuminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((start) => {
    const channel = parseInt(hex.slice(start, start + 2), 16) / 255
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

/** Contrast ratio, WCAG 2.2 (https://www.w3.org/TR/WCAG22/#dfn-contrast-ratio). */
function contrastRatio(first: string, second: string): number {
  const [darker = 0, lighter = 0] = [relativeLuminance(first), relativeLuminance(second)].sort(
    (a, b) => a - b,
  )
  return (lighter + 0.05) / (darker + 0.05)
}

const grounds = ['paper', 'sheet', 'band', 'band-strong'] as const
const writing = ['ink', 'slate', 'chestnut', 'chestnut-deep', 'good', 'bad', 'warn', 'calm'] as const
const meanings = ['good', 'bad', 'warn', 'calm'] as const

const textPairs = [
  ...grounds.flatMap((ground) => writing.map((text) => [text, ground] as const)),
  ...meanings.flatMap((meaning) => [
    [meaning, `${meaning}-ground`] as const,
    ['ink', `${meaning}-ground`] as const,
    ['chestnut', `${meaning}-ground`] as const,
  ]),
  ['on-action', 'action'] as const,
  ['on-action', 'action-deep'] as const,
]

const operablePairs = [
  ...grounds.flatMap((ground) => [['edge', ground] as const, ['focus', ground] as const]),
  ...['air-play', 'air-review', 'air-unidentified', 'air-gap'].map((mark) => [mark, 'sheet'] as const),
]

describe.each(['light', 'dark'] as const)('%s theme', (mode) => {
  const tokens = readTokens(mode)
  const ratioOf = (first: string, second: string): number => {
    const [one, two] = [tokens.get(first), tokens.get(second)]
    if (one === undefined || two === undefined) throw new Error(`No token ${first} or ${second}`)
    return contrastRatio(one, two)
  }

  it('measures the published extreme', () => {
    expect(contrastRatio('#000000', '#ffffff')).toBeCloseTo(21, 5)
  })

  it.each(textPairs)('%s on %s reads at 4.5:1 or more (1.4.3)', (text, ground) => {
    expect(ratioOf(text, ground)).toBeGreaterThanOrEqual(4.5)
  })

  it.each(operablePairs)('%s on %s can be seen at 3:1 or more (1.4.11)', (mark, ground) => {
    expect(ratioOf(mark, ground)).toBeGreaterThanOrEqual(3)
  })
})
