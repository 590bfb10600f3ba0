import { formatMoney } from '@fieldfare/royalty'
import { type StatementDocument } from '../statement-document.ts'
import { formatDay, formatPeriod } from '../statement-words.ts'
import { type Canvas, type StyledText } from './canvas.ts'
import { COLOURS, LEFT, RIGHT, WIDTH } from './page-layout.ts'
import { body, code, small } from './styles.ts'

const FACTS_WIDTH = 214
const FACT_LABEL_WIDTH = 84

/** The top of the first page: whose statement it is, for whom, for which month, and the amount. */
export function drawHead(canvas: Canvas, statement: StatementDocument): void {
  canvas.y = 48
  canvas.artifact(() => {
    canvas.pdf.rect(LEFT, canvas.y, 36, 4).fill(COLOURS.ochre)
  })
  canvas.y += 12
  canvas.paragraph(
    { text: statement.societyName, face: 'serifStrong', size: 12, colour: COLOURS.slate },
    { after: 14 },
  )
  canvas.paragraph(
    { text: `Royalty statement, ${statement.monthLabel}`, face: 'serif', size: 24, colour: COLOURS.chestnut },
    { type: 'H1', after: 14 },
  )
  if (statement.status === 'draft') drawDraftNotice(canvas)
  const top = canvas.y
  drawPayee(canvas, statement)
  const payeeBottom = canvas.y
  canvas.y = top
  drawFacts(canvas, factsOf(statement))
  canvas.y = Math.max(payeeBottom, canvas.y) + 14
  drawAmount(canvas, statement)
}

function drawDraftNotice(canvas: Canvas): void {
  const text = body('Draft. This statement is not approved yet; its figures may still change.')
  const height = canvas.heightOf(text, WIDTH - 24)
  canvas.artifact(() => {
    canvas.pdf
      .lineWidth(1)
      .rect(LEFT, canvas.y, WIDTH, height + 12)
      .stroke(COLOURS.chestnut)
  })
  canvas.content('P', () => canvas.set(text, LEFT + 12, canvas.y + 6, WIDTH - 24))
  canvas.y += height + 26
}

function drawPayee(canvas: Canvas, { payeeName, ipiNameNumber }: StatementDocument): void {
  const width = WIDTH - FACTS_WIDTH - 24
  const ipi = ipiNameNumber === null ? small('No IPI name number on record') : code(`IPI ${ipiNameNumber}`)
  canvas.paragraph(small('Payee'), { width, after: 1 })
  canvas.paragraph({ text: payeeName, face: 'serif', size: 15 }, { width, after: 3 })
  canvas.paragraph(ipi, { width, after: 0 })
}

type Fact = { label: string; value: StyledText }

function factsOf(statement: StatementDocument): readonly Fact[] {
  const { approvedOn, issuedOn } = statement
  return [
    { label: 'Statement', value: { ...code(statement.statementNumber), size: 9, colour: COLOURS.ink } },
    { label: 'Period of use', value: body(formatPeriod(statement.firstDay, statement.lastDay)) },
    { label: 'Currency', value: body(statement.currency) },
    { label: 'Rules', value: body(`Version ${statement.ruleVersion}`) },
    { label: 'Approved', value: body(approvedOn === null ? 'Not yet' : formatDay(approvedOn)) },
    { label: 'Issued', value: body(issuedOn === null ? 'Not yet' : formatDay(issuedOn)) },
  ]
}

/** Labels and values are a table to whoever has the page read out: side by side they would run into one word. */
function drawFacts(canvas: Canvas, facts: readonly Fact[]): void {
  const x = RIGHT - FACTS_WIDTH
  const width = FACTS_WIDTH - FACT_LABEL_WIDTH
  const table = canvas.element('Table')
  for (const { label, value } of facts) {
    const baseline = canvas.y + canvas.ascentOf(body(label))
    const row = canvas.element('TR', table)
    const drawLabel = (): void => canvas.setOnBaseline(small(label), x, baseline, FACT_LABEL_WIDTH)
    const drawValue = (): void => canvas.setOnBaseline(value, x + FACT_LABEL_WIDTH, baseline, width)
    canvas.content('TH', drawLabel, row, { scope: 'Row' })
    canvas.content('TD', drawValue, row)
    row.end()
    canvas.y += canvas.heightOf(value, width) + 2.5
  }
  table.end()
}

function drawAmount(canvas: Canvas, { netMinor, currency }: StatementDocument): void {
  const amount: StyledText = {
    text: formatMoney(netMinor, currency),
    face: 'monoStrong',
    size: 17,
    align: 'right',
  }
  const label: StyledText = { text: 'Attributed to you for the month', face: 'serif', size: 13 }
  canvas.rule(canvas.y, { weight: 1, colour: COLOURS.ink })
  const baseline = canvas.y + 25
  canvas.content('P', () => canvas.setOnBaseline(label, LEFT, baseline, WIDTH / 2))
  canvas.content('P', () => canvas.setOnBaseline(amount, LEFT + WIDTH / 2 - 20, baseline, WIDTH / 2 + 20))
  canvas.y += 39
  canvas.rule(canvas.y, { weight: 1, colour: COLOURS.ink })
  canvas.y += 16
}
