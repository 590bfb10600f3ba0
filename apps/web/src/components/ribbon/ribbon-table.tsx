import { formatClock } from '../../lib/format-time.ts'
import { Duration } from '../figures.tsx'
import { ribbonKindLabels, type RibbonSpan } from './ribbon-spans.ts'

type RibbonTableProps = {
  spans: readonly RibbonSpan[]
  timeZone: string
  caption: string
  onOpen: ((span: RibbonSpan) => void) | undefined
}

/** The ribbon in words: what the picture shows, for those who cannot see it or want to copy it. */
export function RibbonTable({ spans, timeZone, caption, onOpen }: RibbonTableProps) {
  return (
    <div
      role="region"
      aria-label={caption}
      // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- a scrolling region must take the focus to be scrolled by keys (WCAG 2.1.1)
      tabIndex={0}
      className="print-whole mt-3 max-h-96 overflow-auto border-y border-hairline"
    >
      <table className="w-full text-[0.95rem]">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="text-left">
            <th scope="col" className="sticky top-0 bg-band px-3 py-1.5">
              From
            </th>
            <th scope="col" className="sticky top-0 bg-band px-3 py-1.5">
              To
            </th>
            <th scope="col" className="sticky top-0 bg-band px-3 py-1.5 text-right">
              Length
            </th>
            <th scope="col" className="sticky top-0 bg-band px-3 py-1.5">
              What
            </th>
          </tr>
        </thead>
        <tbody>
          {spans.map((span) => (
            <tr key={span.key}>
              <td className="border-t border-hairline px-3 py-1 figures">
                {formatClock(span.fromMs, timeZone, 'second')}
              </td>
              <td className="border-t border-hairline px-3 py-1 figures">
                {formatClock(span.toMs, timeZone, 'second')}
              </td>
              <td className="border-t border-hairline px-3 py-1 text-right">
                <Duration seconds={(span.toMs - span.fromMs) / 1000} />
              </td>
              <td className="border-t border-hairline px-3 py-1">
                <SpanName span={span} onOpen={onOpen} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

function SpanName({ span, onOpen }: { span: RibbonSpan; onOpen: RibbonTableProps['onOpen'] }) {
  const kind = ribbonKindLabels[span.kind]
  const text = span.label === null ? kind : `${kind}: ${span.label}`
  if (onOpen === undefined || (span.detectionId === null && span.playId === null)) return text
  return (
    <button type="button" className="text-left link" onClick={() => onOpen(span)}>
      {text}
    </button>
  )
}
