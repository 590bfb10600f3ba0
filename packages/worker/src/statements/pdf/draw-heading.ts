import { type Canvas, type StyledText } from './canvas.ts'
import { COLOURS } from './page-layout.ts'

const PARTS = { face: 'serif', size: 18, colour: COLOURS.chestnut } as const
const SECTIONS = { face: 'serifStrong', size: 12.5, colour: COLOURS.chestnut } as const

/** A heading of the second level, kept on one page with at least `followingHeight` of what it heads. */
export function drawSectionHeading(canvas: Canvas, text: string, followingHeight = 40): void {
  drawHeading(canvas, { ...SECTIONS, text }, 'H3', followingHeight)
}

/** The heading of a part of the statement. */
export function drawPartHeading(canvas: Canvas, text: string, followingHeight = 80): void {
  drawHeading(canvas, { ...PARTS, text }, 'H2', followingHeight)
}

function drawHeading(canvas: Canvas, styled: StyledText, type: string, followingHeight: number): void {
  canvas.reserve(styled.size * 1.5 + 8 + followingHeight)
  canvas.y += 4
  canvas.paragraph(styled, { type, after: 4 })
}
