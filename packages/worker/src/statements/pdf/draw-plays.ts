import { type NumberedPlay } from '../number-plays.ts'
import { formatDuration } from '../statement-words.ts'
import { type Canvas } from './canvas.ts'
import { drawPartHeading, drawStationHeading } from './draw-heading.ts'
import { WIDTH } from './page-layout.ts'
import { body, code, figure, small } from './styles.ts'
import { type Column, drawTable } from './table.ts'

const NUMBER_WIDTH = 40
const TIME_WIDTH = 112
const LENGTH_WIDTH = 50
const CREDITED_WIDTH = 56
const REFERENCE_WIDTH = 84
const TITLE_WIDTH = WIDTH - NUMBER_WIDTH - TIME_WIDTH - LENGTH_WIDTH - CREDITED_WIDTH - REFERENCE_WIDTH

const COLUMNS: readonly Column<NumberedPlay>[] = [
  { heading: 'Play', width: NUMBER_WIDTH, align: 'left', cell: ({ number }) => [figure(`${number}`)] },
  {
    heading: 'Start, station time',
    width: TIME_WIDTH,
    align: 'left',
    cell: ({ localStart }) => [figure(localStart.replace('T', ' '))],
  },
  {
    heading: 'Recording',
    width: TITLE_WIDTH,
    align: 'left',
    cell: ({ recordingTitle }) => [{ ...body(recordingTitle), size: 8.5 }],
  },
  {
    heading: 'Length',
    width: LENGTH_WIDTH,
    align: 'right',
    cell: ({ durationSeconds }) => [figure(formatDuration(durationSeconds))],
  },
  {
    heading: 'Credited',
    width: CREDITED_WIDTH,
    align: 'right',
    cell: ({ creditedSeconds }) => [figure(formatDuration(creditedSeconds))],
  },
  {
    heading: 'Reference',
    width: REFERENCE_WIDTH,
    align: 'right',
    cell: ({ reference }) => [code(reference)],
  },
]

/** The appendix every line leads to: each play with its number, station by station. */
export function drawPlays(canvas: Canvas, plays: readonly NumberedPlay[]): void {
  if (plays.length === 0) return
  drawPartHeading(canvas, 'Plays behind the lines', 120)
  const part = canvas.pdf.outline.addItem('Plays behind the lines', { expanded: true })
  canvas.paragraph(
    body(
      'A play is listed once, under the number its lines give. The sound of each is kept under its reference.',
    ),
    { after: 4 },
  )
  const stations = new Map(plays.map(({ stationName, timeZone }) => [stationName, timeZone]))
  for (const [stationName, timeZone] of stations) {
    drawStationHeading(canvas, stationName, 70)
    part.addItem(stationName)
    canvas.paragraph(small(`Times in ${timeZone}`), { after: 2 })
    drawTable(canvas, {
      columns: COLUMNS,
      subject: stationName,
      rowPadding: 1.25,
      rows: plays.filter((play) => play.stationName === stationName),
    })
    canvas.y += 6
  }
}
