import { type Canvas, type StyledText } from './canvas.ts'
import { COLOURS } from './page-layout.ts'

const PARTS = { face: 'serif', size: 18, colour: COLOURS.chestnut } as const
const SECTIONS = { face: 'serifStrong', size: 12.5, colour: COLOURS.chestnut } as const

/** Room above the heading of a part, in points. */
const PART_SPACE = 14

/** The heading of a section of the summary, kept on one page with `followingHeight` of what it heads. */
export function drawSectionHeading(canvas: Canvas, text: string, followingHeight: number): void {
  drawHeading(canvas, { ...SECTIONS, text }, 'H2', followingHeight)
}

/** The heading of a part of the statement after the summary. */
export function drawPartHeading(canvas: Canvas, text: string, followingHeight: number): void {
  canvas.y += PART_SPACE
  drawHeading(canvas, { ...PARTS, text }, 'H2', followingHeight)
}

/** The heading of a station within a part. */
export function drawStationHeading(canvas: Canvas, text: string, followingHeight: number): void {
  drawHeading(canvas, { ...SECTIONS, text }, 'H3', followingHeight)
}

function drawHeading(canvas: Canvas, styled: StyledText, type: string, followingHeight: number): void {
  canvas.reserve(styled.size * 1.5 + 8 + followingHeight)
  canvas.y += 4
  canvas.paragraph(styled, { type, after: 4 })
}
