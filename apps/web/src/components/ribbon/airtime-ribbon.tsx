import type { AirtimeSpan } from '@fieldfare/contracts'
import { ChevronLeft, ChevronRight, Maximize2, Table2, ZoomIn, ZoomOut } from 'lucide-react'
import { useMemo, useRef, useState } from 'react'
import { formatClock, formatZone } from '../../lib/format-time.ts'
import { formatDuration } from '../../lib/format.ts'
import { Button, IconButton } from '../button.tsx'
import { RibbonCanvas } from './ribbon-canvas.tsx'
import { RibbonLegend } from './ribbon-legend.tsx'
import { eventKinds, ribbonKindLabels, ribbonSpans, type RibbonSpan } from './ribbon-spans.ts'
import { RibbonTable } from './ribbon-table.tsx'
import { useRibbonKeys } from './use-ribbon-keys.ts'
import { useRibbonView } from './use-ribbon-view.ts'
import type { RibbonView } from './ribbon-view.ts'

export type AirtimeRibbonProps = {
  /** What the ribbon shows, for its name and the table's: "Airtime of RADIO ONE on Sun 29 Nov 2026". */
  label: string
  from: string
  to: string
  timeZone: string
  spans: readonly AirtimeSpan[]
  /** A play, review or unidentified stretch was opened by click, Enter or from the table. */
  onOpen?: (span: RibbonSpan) => void
  /** Start zoomed in, for example on one detection. */
  initialView?: { from: string; to: string }
}

/** One stretch of airtime, usually a station-day, as a ribbon from midnight to midnight. */
export function AirtimeRibbon(props: AirtimeRibbonProps) {
  // Another day is another ribbon: its zoom and focus start anew.
  return <Ribbon key={`${props.from} ${props.to}`} {...props} />
}

function readView(view: { from: string; to: string }): RibbonView {
  return { fromMs: Date.parse(view.from), toMs: Date.parse(view.to) }
}

function describeSpan(span: RibbonSpan, timeZone: string): string {
  const start = formatClock(span.fromMs, timeZone, 'second')
  const what =
    span.label === null ? ribbonKindLabels[span.kind] : `${ribbonKindLabels[span.kind]}, ${span.label}`
  return `${what}, from ${start}, ${formatDuration((span.toMs - span.fromMs) / 1000)}`
}

function Ribbon({ label, from, to, timeZone, spans, onOpen, initialView }: AirtimeRibbonProps) {
  const bounds = useMemo(() => readView({ from, to }), [from, to])
  const drawn = useMemo(() => ribbonSpans(spans, bounds), [spans, bounds])
  const events = useMemo(() => drawn.filter((span) => eventKinds.has(span.kind)), [drawn])
  const kinds = useMemo(() => new Set(drawn.map((span) => span.kind)), [drawn])
  const surface = useRef<HTMLDivElement>(null)
  const controls = useRibbonView(
    bounds,
    surface,
    initialView === undefined ? undefined : readView(initialView),
  )
  const [isTableShown, setIsTableShown] = useState(false)
  const { focused, setFocusKey, handleKeyDown } = useRibbonKeys({ events, controls, onOpen })

  return (
    <figure className="grid gap-2">
      <RibbonToolbar
        from={from}
        timeZone={timeZone}
        controls={controls}
        isTableShown={isTableShown}
        onToggleTable={() => setIsTableShown(!isTableShown)}
      />
      {/* eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions -- an application region is operated by keys */}
      <div
        ref={surface}
        role="application"
        aria-roledescription="airtime ribbon"
        aria-label={`${label}. Arrow keys go from play to play, plus and minus zoom, 0 shows all, Enter opens.`}
        // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- an application region is operated by keys
        tabIndex={0}
        onKeyDown={handleKeyDown}
        className="select-none"
      >
        <RibbonCanvas
          spans={drawn}
          events={events}
          bounds={bounds}
          controls={controls}
          timeZone={timeZone}
          focused={focused}
          onPick={(span) => {
            setFocusKey(span.key)
            onOpen?.(span)
          }}
        />
      </div>
      <figcaption className="grid gap-1">
        <FocusLine focused={focused} count={events.length} timeZone={timeZone} />
        <RibbonLegend kinds={kinds} />
      </figcaption>
      {isTableShown && <RibbonTable spans={drawn} timeZone={timeZone} caption={label} onOpen={onOpen} />}
    </figure>
  )
}

function FocusLine({
  focused,
  count,
  timeZone,
}: {
  focused: RibbonSpan | null
  count: number
  timeZone: string
}) {
  const summary =
    count === 0
      ? 'No plays in this stretch.'
      : `${count} stretches can be opened. Drag to move, Ctrl and the wheel to zoom, arrow keys from one to the next.`
  return (
    <p aria-live="polite" className="min-h-6 text-[0.95rem]">
      {focused === null ? <span className="text-slate">{summary}</span> : describeSpan(focused, timeZone)}
    </p>
  )
}

type RibbonToolbarProps = {
  from: string
  timeZone: string
  controls: ReturnType<typeof useRibbonView>
  isTableShown: boolean
  onToggleTable: () => void
}

function RibbonToolbar({ from, timeZone, controls, isTableShown, onToggleTable }: RibbonToolbarProps) {
  const { view, isWhole, zoom, pan, showWhole } = controls
  return (
    <div className="no-print flex flex-wrap items-center justify-between gap-x-4">
      <p className="figures text-slate">
        {formatClock(view.fromMs, timeZone, 'second')} – {formatClock(view.toMs, timeZone, 'second')}{' '}
        {formatZone(from, timeZone)}
      </p>
      <div role="group" aria-label="Ribbon" className="flex flex-wrap items-center">
        <IconButton icon={ChevronLeft} label="Earlier" disabled={isWhole} onClick={() => pan(-0.5)} />
        <IconButton icon={ChevronRight} label="Later" disabled={isWhole} onClick={() => pan(0.5)} />
        <IconButton icon={ZoomIn} label="Look closer" onClick={() => zoom(0.5)} />
        <IconButton icon={ZoomOut} label="Look wider" disabled={isWhole} onClick={() => zoom(2)} />
        <IconButton icon={Maximize2} label="Show all" disabled={isWhole} onClick={showWhole} />
        <Button tone="quiet" icon={Table2} aria-expanded={isTableShown} onClick={onToggleTable}>
          {isTableShown ? 'Hide the table' : 'Show as table'}
        </Button>
      </div>
    </div>
  )
}
