/** A4 in points, ISO 216: 210 × 297 mm. */
export const PAGE = { width: 595.28, height: 841.89 } as const

export const LEFT = 54
export const RIGHT = PAGE.width - 54
export const WIDTH = RIGHT - LEFT
export const TOP = 70
export const BOTTOM = PAGE.height - 66

/** The product's palette in the strengths that still tell apart when printed in black and white. */
export const COLOURS = {
  ink: '#20262b',
  slate: '#56656f',
  chestnut: '#7b3f2a',
  ochre: '#d8a13c',
  hairline: '#c9ced2',
} as const
