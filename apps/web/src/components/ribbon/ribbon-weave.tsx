import { useEffect, useMemo, useRef, type KeyboardEvent } from 'react'
import { Link } from 'react-router'
import { formatHours } from '../../lib/format.ts'
import { formatDay, formatShortDay } from '../../lib/format-time.ts'
import { useShownTheme } from '../../lib/theme.ts'
import { RibbonLegend } from './ribbon-legend.tsx'
import { paintRibbon } from './ribbon-paint.ts'
import { ribbonSpans, type TimedKind } from './ribbon-spans.ts'
import type { RibbonView } from './ribbon-view.ts'
import { useElementWidth } from './use-element-width.ts'

export type WeaveDay = {
  day: string
  from: string
  to: string
  heldSeconds: number
  plays: number
  spans: readonly TimedKind[]
}

export type RibbonWeaveProps = {
  /** What the weave shows: "Airtime of RADIO ONE in November 2026". */
  label: string
  days: readonly WeaveDay[]
  /** Where a day leads. */
  dayHref: (day: string) => string
}

/** A month: a thin ribbon a day, each one a link to its day. The figures beside them are its table. */
export function RibbonWeave({ label, days, dayHref }: RibbonWeaveProps) {
  const kinds = useMemo(
    () => new Set(days.flatMap((day) => ribbonSpans(day.spans, boundsOf(day)).map((span) => span.kind))),
    [days],
  )
  const handleKeyDown = (event: KeyboardEvent<HTMLTableElement>) => {
    const links = Array.from(event.currentTarget.querySelectorAll<HTMLAnchorElement>('a'))
    const index = links.findIndex((link) => link === document.activeElement)
    const target = {
      ArrowDown: links[index + 1],
      ArrowUp: links[index - 1],
      Home: links[0],
      End: links.at(-1),
    }[event.key]
    if (index < 0 || target === undefined) return
    event.preventDefault()
    target.focus()
  }
  return (
    <figure className="grid gap-3">
      {/* eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions -- keys only add to the links inside */}
      <table
        aria-label={label}
        onKeyDown={handleKeyDown}
        className="w-full border-separate border-spacing-0 text-sm"
      >
        <thead>
          <tr className="text-left text-slate">
            <th scope="col" className="pr-3 font-semibold">
              Day
            </th>
            <th scope="col" className="w-full font-semibold">
              Midnight to midnight
            </th>
            <th scope="col" className="pl-3 text-right font-semibold max-sm:sr-only">
              Held
            </th>
            <th scope="col" className="pl-3 text-right font-semibold">
              Plays
            </th>
          </tr>
        </thead>
        <tbody>
          {days.map((day) => (
            <WeaveRow key={day.day} day={day} href={dayHref(day.day)} />
          ))}
        </tbody>
      </table>
      <figcaption>
        <RibbonLegend kinds={kinds} />
      </figcaption>
    </figure>
  )
}

function boundsOf(day: WeaveDay): RibbonView {
  return { fromMs: Date.parse(day.from), toMs: Date.parse(day.to) }
}

function WeaveRow({ day, href }: { day: WeaveDay; href: string }) {
  return (
    <tr className="group relative hover:bg-band">
      <th scope="row" className="pr-3 text-left font-normal whitespace-nowrap">
        {/* The link covers the row, so that the whole ribbon can be pressed. */}
        <Link to={href} aria-label={formatDay(day.day)} className="link after:absolute after:inset-0">
          {formatShortDay(day.day)}
        </Link>
      </th>
      <td className="py-px">
        <ThinRibbon day={day} />
      </td>
      <td className="pl-3 text-right figures max-sm:sr-only">{formatHours(day.heldSeconds)}</td>
      <td className="pl-3 text-right figures">{day.plays}</td>
    </tr>
  )
}

function ThinRibbon({ day }: { day: WeaveDay }) {
  const canvas = useRef<HTMLCanvasElement>(null)
  const width = useElementWidth(canvas)
  const theme = useShownTheme()
  useEffect(() => {
    if (canvas.current === null || width === 0) return
    const bounds = boundsOf(day)
    paintRibbon(canvas.current, ribbonSpans(day.spans, bounds), bounds, true)
  }, [day, width, theme])
  return (
    <div className="h-4.5 min-w-24 bg-sheet">
      <canvas ref={canvas} aria-hidden className="block size-full" />
    </div>
  )
}
