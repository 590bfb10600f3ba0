import { formatAmount } from '@fieldfare/royalty'
import { formatNumbers, type PlayNumbers } from '../number-plays.ts'
import { type StatementDocument, type StatementLine, type StatementSection } from '../statement-document.ts'
import { formatCoverage, formatDuration, formatPercent, nameRight } from '../statement-words.ts'
import { type Canvas, type StyledText } from './canvas.ts'
import { drawPartHeading, drawStationHeading } from './draw-heading.ts'
import { WIDTH } from './page-layout.ts'
import { body, code, figure, small, strong, total } from './styles.ts'
import { type Column, drawTable, GUTTER } from './table.ts'

const NUMBER_WIDTH = 30
const RIGHT_WIDTH = 56
const PLAYS_WIDTH = 38
const CREDITED_WIDTH = 54
const SHARE_WIDTH = 68
const AMOUNT_WIDTH = 76
const TITLE_WIDTH =
  WIDTH - NUMBER_WIDTH - RIGHT_WIDTH - PLAYS_WIDTH - CREDITED_WIDTH - SHARE_WIDTH - AMOUNT_WIDTH

/** The width of every letter of the monospaced face, in parts of the type size. */
const MONO_ADVANCE = 0.6

/** A line under its number, or the sum that closes a station. */
type LineRow =
  { kind: 'line'; number: number; line: StatementLine } | { kind: 'total'; section: StatementSection }

/** Every line, station by station, each with the numbers of its plays. Numbers run through the statement. */
export function drawLines(canvas: Canvas, statement: StatementDocument, numbers: PlayNumbers): void {
  if (statement.sections.length === 0) return
  drawPartHeading(canvas, 'Lines by station', 120)
  const part = canvas.pdf.outline.addItem('Lines by station', { expanded: true })
  const columns = lineColumns(statement.currency, numbers)
  let before = 0
  for (const section of statement.sections) {
    drawStationHeading(canvas, section.stationName, 90)
    part.addItem(section.stationName)
    canvas.paragraph(small(describe(section)), { after: 2 })
    const first = before
    drawTable<LineRow>(canvas, {
      columns,
      subject: section.stationName,
      rows: section.lines.map((line, index) => ({ kind: 'line', number: first + index + 1, line })),
      totals: [{ kind: 'total', section }],
    })
    before += section.lines.length
    canvas.y += 6
  }
}

function describe({ timeZone, heldSeconds, expectedSeconds, lines }: StatementSection): string {
  const count = lines.length === 1 ? '1 line' : `${lines.length} lines`
  return `${count} · log coverage ${formatCoverage(heldSeconds, expectedSeconds)} · times in ${timeZone}`
}

function lineColumns(currency: string, numbers: PlayNumbers): readonly Column<LineRow>[] {
  const amountOf = (row: LineRow): bigint =>
    row.kind === 'line' ? row.line.amountMinor : row.section.netMinor
  return [
    column('No.', NUMBER_WIDTH, 'left', ({ number }) => [code(`${number}`)]),
    {
      heading: 'Title and creators',
      width: TITLE_WIDTH,
      align: 'left',
      cell: (row) =>
        row.kind === 'total' ? [strong(`Total ${row.section.stationName}`)] : describeLine(row.line, numbers),
    },
    column('For', RIGHT_WIDTH, 'left', ({ line }) => [small(nameRight(line.right))]),
    column('Plays', PLAYS_WIDTH, 'right', ({ line }) => [figure(`${line.plays.length}`)]),
    column('Credited', CREDITED_WIDTH, 'right', ({ line }) => [figure(creditedTime(line))]),
    column('Share', SHARE_WIDTH, 'right', ({ line }) => [figure(formatPercent(line.sharePpm))]),
    {
      heading: currency,
      width: AMOUNT_WIDTH,
      align: 'right',
      cell: (row) => {
        const text = formatAmount(amountOf(row), currency)
        return [row.kind === 'line' ? figure(text) : total(text)]
      },
    },
  ]
}

/** A column that is empty in the closing row. */
function column(
  heading: string,
  width: number,
  align: 'left' | 'right',
  cell: (row: LineRow & { kind: 'line' }) => ReturnType<Column<LineRow>['cell']>,
): Column<LineRow> {
  return { heading, width, align, cell: (row) => (row.kind === 'line' ? cell(row) : []) }
}

function describeLine(line: StatementLine, numbers: PlayNumbers): ReturnType<Column<LineRow>['cell']> {
  const own = numbers.of(line)
  const plays = `${own.length === 1 ? 'play' : 'plays'} ${formatNumbers(own)}`
  return [body(line.title), small(line.creators), ...codesOf(line.code, plays)].filter(
    ({ text }) => text !== '',
  )
}

/** Code and plays share a line where they fit, so that a range of plays is not broken in two. */
function codesOf(lineCode: string | null, plays: string): readonly StyledText[] {
  if (lineCode === null) return [code(plays)]
  const together = code(`${lineCode} · ${plays}`)
  const fits = together.text.length * together.size * MONO_ADVANCE <= TITLE_WIDTH - GUTTER
  return fits ? [together] : [code(lineCode), code(plays)]
}

function creditedTime({ creditedMs }: StatementLine): string {
  return formatDuration(Number(creditedMs / 1000n))
}
