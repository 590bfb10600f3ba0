import { checkStatement } from './check-statement.ts'
import { numberPlays } from './number-plays.ts'
import { Canvas } from './pdf/canvas.ts'
import { drawHead } from './pdf/draw-head.ts'
import { drawLines } from './pdf/draw-lines.ts'
import { drawPlays } from './pdf/draw-plays.ts'
import { drawHoldbacks, drawNotes, drawSummary } from './pdf/draw-summary.ts'
import { COLOURS, LEFT, PAGE, WIDTH } from './pdf/page-layout.ts'
import { small } from './pdf/styles.ts'
import { MISSING_LETTER } from './pdf/typefaces.ts'
import { type StatementDocument } from './statement-document.ts'

const RUNNING_HEAD_Y = 38
const FOOT_Y = PAGE.height - 46

/**
 * The statement as a PDF on A4: typefaces embedded, structure, language and title for assistive software, bookmarks,
 * a running head, and the page number out of how many on every page. The same document gives the same bytes.
 *
 * Letters are Latin, Greek and Cyrillic; any other is shown as a box and the statement says so.
 *
 * @throws RoyaltyError `not-closed` when the statement does not add up
 */
export async function renderStatementPdf(statement: StatementDocument): Promise<Buffer> {
  checkStatement(statement)
  const { societyName, statementNumber, monthLabel, payeeName } = statement
  const canvas = new Canvas({
    title: `Royalty statement ${statementNumber}, ${monthLabel}`,
    author: societyName,
    subject: `${payeeName}, ${monthLabel}`,
    createdAt: new Date(statement.createdAt),
  })
  const numbers = numberPlays(statement)
  canvas.pdf.outline.addItem('Summary')
  drawHead(canvas, statement)
  drawSummary(canvas, statement)
  drawHoldbacks(canvas, statement)
  drawNotes(canvas, statement)
  drawLines(canvas, statement, numbers)
  drawPlays(canvas, numbers.plays)
  if (canvas.lostLetters) {
    canvas.paragraph(
      small(
        `Some letters are outside the typefaces of this file and are shown as ${MISSING_LETTER}. The CSV file of this ` +
          'statement has every name in full.',
      ),
    )
  }
  return canvas.finish((page, pages) => drawFurniture(canvas, statement, page, pages))
}

/** What repeats on every page. The first page has its own head. */
function drawFurniture(canvas: Canvas, statement: StatementDocument, page: number, pages: number): void {
  const draft = statement.status === 'draft' ? 'Draft · ' : ''
  const pdf = canvas.pdf
  pdf
    .lineWidth(0.5)
    .moveTo(LEFT, FOOT_Y - 7)
    .lineTo(LEFT + WIDTH, FOOT_Y - 7)
    .stroke(COLOURS.hairline)
  canvas.set(small(`${draft}Statement ${statement.statementNumber}`), LEFT, FOOT_Y, WIDTH / 2)
  canvas.set({ ...small(`Page ${page} of ${pages}`), align: 'right' }, LEFT + WIDTH / 2, FOOT_Y, WIDTH / 2)
  if (page === 1) return
  const names = small(`${statement.societyName} · ${statement.payeeName}`)
  canvas.set(canvas.shorten(names, WIDTH - 130), LEFT, RUNNING_HEAD_Y, WIDTH - 120)
  canvas.set({ ...small(statement.monthLabel), align: 'right' }, LEFT + WIDTH - 120, RUNNING_HEAD_Y, 120)
  pdf
    .lineWidth(0.5)
    .moveTo(LEFT, RUNNING_HEAD_Y + 15)
    .lineTo(LEFT + WIDTH, RUNNING_HEAD_Y + 15)
    .stroke(COLOURS.hairline)
}
