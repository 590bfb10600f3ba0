import type { DetectionDetail } from '@fieldfare/contracts'
import { useRef } from 'react'
import { ChartFrame, type ChartColumn } from '../../components/chart-frame.tsx'
import { useElementWidth } from '../../components/ribbon/use-element-width.ts'
import { formatDuration } from '../../lib/format.ts'
import { describeAlignment, deviationOf, type EvidencePair } from './detection-words.ts'
import { extentOf, ticksWithin } from './plot-scale.ts'

const HEIGHT = 320
const PAD = { left: 64, right: 12, top: 12, bottom: 48 }
const UNMEASURED_WIDTH = 560

/** Where log and reference agree: a play is a straight line, chance would be a cloud. */
export function AlignmentPlot({ detection }: { detection: DetectionDetail }) {
  const columns: readonly ChartColumn<EvidencePair>[] = [
    { header: 'In the log', align: 'end', cell: (pair) => seconds(pair.logSeconds) },
    { header: 'In the reference', align: 'end', cell: (pair) => seconds(pair.referenceSeconds) },
    {
      header: 'Beside the line',
      align: 'end',
      cell: (pair) => seconds(Math.abs(deviationOf(pair, detection))),
    },
  ]
  return (
    <ChartFrame
      title="Moments where log and reference agree"
      lead={describeAlignment(detection)}
      rows={detection.evidence}
      rowId={(pair) => `${pair.logSeconds} ${pair.referenceSeconds}`}
      columns={columns}
    >
      <Picture detection={detection} />
    </ChartFrame>
  )
}

function seconds(value: number) {
  return <span className="figures">{value.toFixed(2)} s</span>
}

function Picture({ detection }: { detection: DetectionDetail }) {
  const frame = useRef<HTMLDivElement>(null)
  const measured = useElementWidth(frame)
  const width = measured === 0 ? UNMEASURED_WIDTH : measured
  const { evidence, logStartSeconds, referenceStartSeconds, durationSeconds, speedRatio } = detection
  const logEnd = logStartSeconds + durationSeconds
  const referenceEnd = referenceStartSeconds + durationSeconds * speedRatio
  const log = extentOf([logStartSeconds, logEnd, ...evidence.map((pair) => pair.logSeconds)])
  const reference = extentOf([
    referenceStartSeconds,
    referenceEnd,
    ...evidence.map((pair) => pair.referenceSeconds),
  ])
  const x = (value: number) =>
    PAD.left + ((value - log.from) / (log.to - log.from)) * (width - PAD.left - PAD.right)
  const y = (value: number) =>
    HEIGHT -
    PAD.bottom -
    ((value - reference.from) / (reference.to - reference.from)) * (HEIGHT - PAD.top - PAD.bottom)
  return (
    <div ref={frame} className="min-w-0">
      <svg width={width} height={HEIGHT} className="block max-w-full text-[0.8125rem]">
        <PlotAxes
          width={width}
          logTicks={ticksWithin(log, width < 480 ? 4 : 8).map((value) => ({ value, at: x(value) }))}
          referenceTicks={ticksWithin(reference, 6).map((value) => ({ value, at: y(value) }))}
        />
        <line
          x1={x(logStartSeconds)}
          y1={y(referenceStartSeconds)}
          x2={x(logEnd)}
          y2={y(referenceEnd)}
          strokeDasharray="5 4"
          className="stroke-slate"
        />
        {evidence.map((pair) => (
          <circle
            key={`${pair.logSeconds} ${pair.referenceSeconds}`}
            cx={x(pair.logSeconds)}
            cy={y(pair.referenceSeconds)}
            r={3}
            className="fill-chestnut"
          />
        ))}
      </svg>
    </div>
  )
}

type Tick = { value: number; at: number }

function PlotAxes({
  width,
  logTicks,
  referenceTicks,
}: {
  width: number
  logTicks: readonly Tick[]
  referenceTicks: readonly Tick[]
}) {
  const bottom = HEIGHT - PAD.bottom
  return (
    <g className="fill-slate">
      {referenceTicks.map(({ value, at }) => (
        <g key={value}>
          <line x1={PAD.left} x2={width - PAD.right} y1={at} y2={at} className="stroke-hairline" />
          <text x={PAD.left - 8} y={at + 4} textAnchor="end" className="font-mono">
            {formatDuration(value)}
          </text>
        </g>
      ))}
      {logTicks.map(({ value, at }) => (
        <g key={value}>
          <line x1={at} x2={at} y1={bottom} y2={bottom + 5} className="stroke-edge" />
          <text x={at} y={bottom + 20} textAnchor="middle" className="font-mono">
            {formatDuration(value)}
          </text>
        </g>
      ))}
      <line x1={PAD.left} x2={PAD.left} y1={PAD.top} y2={bottom} className="stroke-edge" />
      <line x1={PAD.left} x2={width - PAD.right} y1={bottom} y2={bottom} className="stroke-edge" />
      <text x={(PAD.left + width - PAD.right) / 2} y={HEIGHT - 6} textAnchor="middle">
        In the log (minutes:seconds)
      </text>
      <text
        x={14}
        y={(PAD.top + bottom) / 2}
        textAnchor="middle"
        transform={`rotate(-90 14 ${(PAD.top + bottom) / 2})`}
      >
        In the reference (m:ss)
      </text>
    </g>
  )
}
