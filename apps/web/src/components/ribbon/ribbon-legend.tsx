import { useEffect, useRef } from 'react'
import { useShownTheme } from '../../lib/theme.ts'
import { paintRibbon } from './ribbon-paint.ts'
import { ribbonKindLabels, type RibbonKind, type RibbonSpan } from './ribbon-spans.ts'

const shownKinds: readonly RibbonKind[] = [
  'play',
  'review',
  'unidentified',
  'music',
  'speech',
  'silence',
  'held',
  'gap',
]

/** What each pattern stands for; only the kinds present, so that it stays short. */
export function RibbonLegend({ kinds }: { kinds: ReadonlySet<RibbonKind> }) {
  return (
    <ul className="flex flex-wrap gap-x-5 gap-y-1 text-sm">
      {shownKinds
        .filter((kind) => kinds.has(kind))
        .map((kind) => (
          <li key={kind} className="flex items-center gap-2">
            <Swatch kind={kind} />
            {ribbonKindLabels[kind]}
          </li>
        ))}
    </ul>
  )
}

function Swatch({ kind }: { kind: RibbonKind }) {
  const canvas = useRef<HTMLCanvasElement>(null)
  const theme = useShownTheme()
  useEffect(() => {
    const whole: RibbonSpan = {
      key: kind,
      kind,
      fromMs: 0,
      toMs: 1,
      label: null,
      logId: null,
      detectionId: null,
      playId: null,
    }
    if (canvas.current !== null) paintRibbon(canvas.current, [whole], { fromMs: 0, toMs: 1 }, true)
  }, [kind, theme])
  return (
    <span aria-hidden className="inline-block h-4 w-8 border border-edge">
      <canvas ref={canvas} className="block size-full" />
    </span>
  )
}
