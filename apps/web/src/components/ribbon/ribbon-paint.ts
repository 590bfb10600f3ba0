import { pixelSpans, type RibbonKind, type RibbonSpan } from './ribbon-spans.ts'
import type { RibbonView } from './ribbon-view.ts'

/** How a kind is told apart without colour. */
export type RibbonPattern = 'solid' | 'dots' | 'rising' | 'falling' | 'upright' | 'hollow'

export const ribbonLook = {
  held: { token: '--color-air-held', pattern: 'solid' },
  music: { token: '--color-air-music', pattern: 'solid' },
  speech: { token: '--color-air-speech', pattern: 'dots' },
  silence: { token: '--color-air-silence', pattern: 'hollow' },
  play: { token: '--color-air-play', pattern: 'solid' },
  review: { token: '--color-air-review', pattern: 'rising' },
  unidentified: { token: '--color-air-unidentified', pattern: 'upright' },
  gap: { token: '--color-air-gap', pattern: 'falling' },
} as const satisfies Record<RibbonKind, { token: string; pattern: RibbonPattern }>

/** Painted from the ground up. Parts of the height: what was heard lies below, what was found above. */
const layers: readonly { kind: RibbonKind; top: number; bottom: number }[] = [
  { kind: 'held', top: 0, bottom: 1 },
  { kind: 'gap', top: 0, bottom: 1 },
  { kind: 'silence', top: 0.64, bottom: 1 },
  { kind: 'speech', top: 0.64, bottom: 1 },
  { kind: 'music', top: 0.64, bottom: 1 },
  { kind: 'unidentified', top: 0, bottom: 0.6 },
  { kind: 'review', top: 0, bottom: 0.6 },
  { kind: 'play', top: 0, bottom: 0.6 },
]

const TILE = 6

/** Canvas cannot use custom properties; this reads a token as the colour it is in the theme now shown. */
export function tokenColour(element: HTMLElement, token: string): string {
  const probe = document.createElement('span')
  probe.style.color = `var(${token})`
  element.append(probe)
  const colour = getComputedStyle(probe).color
  probe.remove()
  return colour
}

function drawTile(context: CanvasRenderingContext2D, pattern: RibbonPattern): void {
  context.lineWidth = 1.6
  context.beginPath()
  if (pattern === 'dots') context.arc(TILE / 2, TILE / 2, 1.1, 0, Math.PI * 2)
  for (const shift of [-TILE, 0, TILE]) {
    if (pattern === 'rising') {
      context.moveTo(shift, TILE)
      context.lineTo(shift + TILE, 0)
    } else if (pattern === 'falling') {
      context.moveTo(shift, 0)
      context.lineTo(shift + TILE, TILE)
    }
  }
  if (pattern === 'upright') {
    context.moveTo(1.5, 0)
    context.lineTo(1.5, TILE)
  }
  if (pattern === 'dots') context.fill()
  else context.stroke()
}

function patternOf(
  context: CanvasRenderingContext2D,
  pattern: RibbonPattern,
  colour: string,
  ground: string,
): string | CanvasPattern {
  const tile = document.createElement('canvas')
  tile.width = TILE
  tile.height = TILE
  const tileContext = tile.getContext('2d')
  if (tileContext === null) return colour
  tileContext.fillStyle = pattern === 'upright' || pattern === 'dots' ? colour : ground
  tileContext.fillRect(0, 0, TILE, TILE)
  const mark = pattern === 'upright' || pattern === 'dots' ? ground : colour
  tileContext.strokeStyle = mark
  tileContext.fillStyle = mark
  drawTile(tileContext, pattern)
  return context.createPattern(tile, 'repeat') ?? colour
}

function fillOf(
  context: CanvasRenderingContext2D,
  canvas: HTMLCanvasElement,
  kind: RibbonKind,
): string | CanvasPattern {
  const { token, pattern } = ribbonLook[kind]
  const host = canvas.parentElement ?? document.body
  const colour = tokenColour(host, token)
  if (pattern === 'solid' || pattern === 'hollow') return colour
  return patternOf(context, pattern, colour, tokenColour(host, '--color-sheet'))
}

/** Fits the canvas to its box at the screen's own resolution; null where there is nothing to draw on. */
export function prepareCanvas(
  canvas: HTMLCanvasElement,
): { context: CanvasRenderingContext2D; width: number; height: number } | null {
  const context = canvas.getContext('2d')
  const { width, height } = canvas.getBoundingClientRect()
  if (context === null || width === 0) return null
  const scale = window.devicePixelRatio
  canvas.width = Math.round(width * scale)
  canvas.height = Math.round(height * scale)
  context.setTransform(scale, 0, 0, scale, 0, 0)
  context.clearRect(0, 0, width, height)
  return { context, width, height }
}

/** Draws a ribbon into a prepared canvas; thin ribbons use the whole height for every kind. */
export function paintRibbon(
  canvas: HTMLCanvasElement,
  spans: readonly RibbonSpan[],
  view: RibbonView,
  thin = false,
): void {
  const prepared = prepareCanvas(canvas)
  if (prepared === null) return
  const { context, width, height } = prepared
  for (const layer of layers) {
    const rectangles = pixelSpans(spans, layer.kind, view, width)
    if (rectangles.length === 0) continue
    context.fillStyle = fillOf(context, canvas, layer.kind)
    const top = thin ? 0 : layer.top * height
    const bottom = thin ? height : layer.bottom * height
    for (const { left, right } of rectangles) {
      // A hair of ground between neighbours keeps two plays in a row apart.
      const gap = right - left > 4 ? 1 : 0
      context.fillRect(left, top, right - left - gap, bottom - top)
    }
  }
}

/** Outlines the span that has the focus. */
export function paintFocus(canvas: HTMLCanvasElement, left: number, right: number): void {
  const context = canvas.getContext('2d')
  if (context === null) return
  const { height } = canvas.getBoundingClientRect()
  context.strokeStyle = tokenColour(canvas.parentElement ?? document.body, '--color-ink')
  context.lineWidth = 2.5
  context.strokeRect(left - 2, 1.25, Math.max(4, right - left + 3), height * 0.6)
}
