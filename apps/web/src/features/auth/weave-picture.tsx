const ROWS = 24
const WIDTH = 240

type Strand = { x: number; width: number; token: string }

/** Small repeatable scatter, so that the picture is the same at each visit (mulberry32, public domain). */
function scatter(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
}

function weaveRow(row: number): Strand[] {
  const next = scatter(row * 7919 + 17)
  const strands: Strand[] = []
  let x = 0
  while (x < WIDTH) {
    const width = 2 + Math.floor(next() * 11)
    const kind = next()
    const token = kind < 0.52 ? '--color-air-play' : kind < 0.62 ? '--color-air-review' : '--color-air-music'
    if (next() < 0.78) strands.push({ x, width: Math.min(width, WIDTH - x), token })
    x += width + 1
  }
  return strands
}

const rows = Array.from({ length: ROWS }, (_, row) => weaveRow(row))

/** A day of airtime as a weave, an hour a row: what the product is about, in one picture. */
export function WeavePicture() {
  return (
    <svg
      aria-hidden
      viewBox={`0 0 ${WIDTH} ${ROWS * 5 - 2}`}
      className="w-full max-w-3xl"
      shapeRendering="crispEdges"
    >
      {rows.map((strands, row) => (
        <g key={row}>
          <rect y={row * 5} width={WIDTH} height="3" style={{ fill: 'var(--color-air-held)' }} />
          {strands.map((strand) => (
            <rect
              key={strand.x}
              x={strand.x}
              y={row * 5}
              width={strand.width}
              height="3"
              style={{ fill: `var(${strand.token})` }}
            />
          ))}
        </g>
      ))}
    </svg>
  )
}
