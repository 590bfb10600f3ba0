/** Recharts props that give every chart the same ink; colours follow the theme by custom property. */
export const chartInk = {
  first: 'var(--color-air-play)',
  second: 'var(--color-air-unidentified)',
  third: 'var(--color-air-review)',
  grid: 'var(--color-hairline)',
} as const

export const chartAxis = {
  stroke: 'var(--color-edge)',
  tick: { fill: 'var(--color-slate)', fontSize: 13 },
  tickLine: false,
} as const

export const chartTooltip = {
  cursor: { fill: 'var(--color-band)' },
  contentStyle: {
    background: 'var(--color-paper)',
    border: '1px solid var(--color-edge)',
    borderRadius: 0,
    color: 'var(--color-ink)',
  },
  itemStyle: { color: 'var(--color-ink)' },
} as const

/** The unit of an axis, written beside it. */
export function axisLabel(text: string, axis: 'x' | 'y') {
  return axis === 'x'
    ? ({
        value: text,
        position: 'insideBottom',
        offset: -4,
        fill: 'var(--color-slate)',
        fontSize: 13,
      } as const)
    : ({
        value: text,
        angle: -90,
        position: 'insideLeft',
        fill: 'var(--color-slate)',
        fontSize: 13,
        style: { textAnchor: 'middle' },
      } as const)
}
