import { formatAmount } from '@fieldfare/royalty'
import {
  type StatementDocument,
  type StatementHoldback,
  type StatementSection,
} from '../statement-document.ts'
import {
  CAUTION,
  COVERAGE_WORDS,
  formatCoverage,
  formatPercent,
  HOLDBACK_WORDS,
  nameRight,
  questionWords,
} from '../statement-words.ts'
import { type Canvas, type StyledText } from './canvas.ts'
import { drawSectionHeading } from './draw-heading.ts'
import { WIDTH } from './page-layout.ts'
import { body, figure, small, strong, total } from './styles.ts'
import { type Column, drawTable } from './table.ts'

const AMOUNT_WIDTH = 92

/** A row whose cells are known in advance. */
type PlainRow = readonly (readonly StyledText[])[]

function plainColumn(
  index: number,
  heading: string,
  width: number,
  align: 'left' | 'right',
): Column<PlainRow> {
  return { heading, width, align, cell: (row) => row[index] ?? [] }
}

/** How the amount came about: from fees, by right and by station. */
export function drawSummary(canvas: Canvas, statement: StatementDocument): void {
  drawCalculation(canvas, statement)
  drawStations(canvas, statement)
}

function drawCalculation(canvas: Canvas, statement: StatementDocument): void {
  const { currency, deductions, netMinor } = statement
  const amount = (amountMinor: bigint): string => formatAmount(amountMinor, currency)
  drawSectionHeading(canvas, 'From licence fees to your amount', 90)
  drawTable<PlainRow>(canvas, {
    columns: [
      plainColumn(0, 'Step', WIDTH - 80 - AMOUNT_WIDTH, 'left'),
      plainColumn(1, 'Rate', 80, 'right'),
      plainColumn(2, currency, AMOUNT_WIDTH, 'right'),
    ],
    rows: [
      [[body('Licence fees behind your works and recordings')], [], [figure(amount(statement.grossMinor))]],
      ...deductions.map(({ label, ratePpm, amountMinor }): PlainRow => [
        [body(`Deduction: ${label}`)],
        [figure(formatPercent(ratePpm))],
        [figure(amount(-amountMinor))],
      ]),
    ],
    totals: [[[strong('Attributed to you')], [], [total(amount(netMinor))]]],
  })
  canvas.paragraph(
    body(
      `Of this, ${currency}\u00a0${amount(statement.worksMinor)} is for rights in works and ` +
        `${currency}\u00a0${amount(statement.recordingsMinor)} for rights in recordings.`,
    ),
    { after: 8 },
  )
}

function drawStations(canvas: Canvas, statement: StatementDocument): void {
  if (statement.sections.length === 0) return
  const amount = (amountMinor: bigint): string => formatAmount(amountMinor, statement.currency)
  const deductedMinor = statement.grossMinor - statement.netMinor
  drawSectionHeading(canvas, 'By station', 60)
  drawTable<PlainRow>(canvas, {
    columns: [
      plainColumn(0, 'Station', WIDTH - 70 - 3 * AMOUNT_WIDTH, 'left'),
      plainColumn(1, 'Log coverage', 70, 'right'),
      plainColumn(2, `Fees, ${statement.currency}`, AMOUNT_WIDTH, 'right'),
      plainColumn(3, 'Deductions', AMOUNT_WIDTH, 'right'),
      plainColumn(4, 'Attributed', AMOUNT_WIDTH, 'right'),
    ],
    rows: statement.sections.map((section): PlainRow => [
      [body(section.stationName)],
      [figure(coverageOf(section))],
      [figure(amount(section.grossMinor))],
      [figure(amount(-section.deductionsMinor))],
      [figure(amount(section.netMinor))],
    ]),
    totals: [
      [
        [strong('All stations')],
        [],
        [total(amount(statement.grossMinor))],
        [total(amount(-deductedMinor))],
        [total(amount(statement.netMinor))],
      ],
    ],
  })
  canvas.paragraph(small(COVERAGE_WORDS), { after: 10 })
}

function coverageOf({ heldSeconds, expectedSeconds }: StatementSection): string {
  return formatCoverage(heldSeconds, expectedSeconds)
}

/** What is kept apart on the payee's works and recordings, and why. */
export function drawHoldbacks(canvas: Canvas, statement: StatementDocument): void {
  drawSectionHeading(canvas, 'Held back', 50)
  if (statement.holdbacks.length === 0) {
    canvas.paragraph(body('Nothing is held back on works and recordings in which you have a share.'), {
      after: 10,
    })
    return
  }
  canvas.paragraph(body(HOLDBACK_WORDS), { after: 4 })
  const { currency } = statement
  const columns: readonly Column<StatementHoldback>[] = [
    {
      heading: 'Title',
      width: 170,
      align: 'left',
      cell: ({ title, creators, right }) => [body(title), small(`${nameRight(right)} · ${creators}`)],
    },
    { heading: 'Station', width: 92, align: 'left', cell: ({ stationName }) => [body(stationName)] },
    {
      heading: 'Reason',
      width: WIDTH - 170 - 92 - AMOUNT_WIDTH,
      align: 'left',
      cell: ({ explanation }) => [small(explanation)],
    },
    {
      heading: `Whole amount, ${currency}`,
      width: AMOUNT_WIDTH,
      align: 'right',
      cell: ({ amountMinor }) => [figure(formatAmount(amountMinor, currency))],
    },
  ]
  drawTable(canvas, { columns, subject: 'Held back', rows: statement.holdbacks })
}

/** How to question the statement, and what standing it has. */
export function drawNotes(canvas: Canvas, statement: StatementDocument): void {
  const words = body(questionWords(statement))
  const caution = small(CAUTION)
  const height = canvas.heightOf(words, WIDTH) + canvas.heightOf(caution, WIDTH) + 12
  drawSectionHeading(canvas, 'Questions and corrections', height)
  canvas.pdf.outline.addItem('Questions and corrections')
  canvas.paragraph(words, { after: 5 })
  canvas.paragraph(caution, { after: 8 })
}
