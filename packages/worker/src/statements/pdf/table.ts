import { type Canvas, type StyledText, type TextStyle } from './canvas.ts'
import { BOTTOM, COLOURS, LEFT, RIGHT } from './page-layout.ts'

/** A column: its heading, its width in points and which edge its text keeps to. */
export type Column<Row> = {
  readonly heading: string
  readonly width: number
  readonly align: 'left' | 'right'
  /** What the cell says: pieces of text below one another. */
  readonly cell: (row: Row) => readonly StyledText[]
}

export type Table<Row> = {
  readonly columns: readonly Column<Row>[]
  readonly rows: readonly Row[]
  /** What the table is about, said again above its headings on every further page. */
  readonly subject?: string
  /** Space above and below the text of a row, in points; less where rows are many and short. */
  readonly rowPadding?: number
  /** Closing rows, ruled off; they stay together with the last row. */
  readonly totals?: readonly Row[]
}

/** The space that keeps a column's text from the next column. */
export const GUTTER = 10
const HEADING_PADDING = 3.5
const ROW_PADDING = 3.5
const HEADING: TextStyle = { face: 'sansStrong', size: 8, colour: COLOURS.slate }

type MeasuredRow = {
  cells: readonly (readonly StyledText[])[]
  padding: number
  ascent: number
  height: number
}

/** Draws a table from the current place on; its headings come again at the top of every page it goes on to. */
export function drawTable<Row>(canvas: Canvas, table: Table<Row>): void {
  const { columns } = table
  const element = canvas.element('Table')
  const rows = table.rows.map((row) => measure(canvas, table, row))
  const totals = (table.totals ?? []).map((row) => measure(canvas, table, row))
  const totalsHeight = totals.reduce((sum, { height }) => sum + height, 0)
  const firstHeight = (rows[0]?.height ?? 0) + (rows.length <= 1 ? totalsHeight : 0)
  canvas.reserve(headingHeight(canvas, columns) + firstHeight)
  drawHeadings(canvas, columns, element)
  for (const [index, row] of rows.entries()) {
    const together = index === rows.length - 1 ? totalsHeight : 0
    if (canvas.y + row.height + together > BOTTOM) {
      canvas.newPage()
      if (table.subject !== undefined) drawContinuation(canvas, table.subject)
      drawHeadings(canvas, columns)
    }
    drawRow(canvas, columns, row, element)
    if (index < rows.length - 1) canvas.rule(canvas.y)
  }
  if (totals.length > 0) canvas.rule(canvas.y, { weight: 1, colour: COLOURS.ink })
  for (const row of totals) drawRow(canvas, columns, row, element)
  if (totals.length > 0) {
    canvas.rule(canvas.y, { weight: 0.75, colour: COLOURS.ink })
    canvas.rule(canvas.y + 2, { weight: 0.75, colour: COLOURS.ink })
  }
  element.end()
  canvas.y += 8
}

function measure<Row>(
  canvas: Canvas,
  { columns, rowPadding = ROW_PADDING }: Table<Row>,
  row: Row,
): MeasuredRow {
  const cells = columns.map(({ cell }) => cell(row))
  const ascent = Math.max(0, ...cells.map((pieces) => firstAscent(canvas, pieces)))
  const heights = cells.map((pieces, index) =>
    pieces.reduce(
      (height, piece) => height + canvas.heightOf(piece, textWidth(columns, index)),
      ascent - firstAscent(canvas, pieces),
    ),
  )
  return { cells, padding: rowPadding, ascent, height: Math.max(...heights) + 2 * rowPadding }
}

/** The first lines of a row's cells stand on one baseline, whatever their face and size. */
function firstAscent(canvas: Canvas, pieces: readonly StyledText[]): number {
  const [first] = pieces
  return first ? canvas.ascentOf(first) : 0
}

function drawContinuation(canvas: Canvas, subject: string): void {
  const styled: StyledText = { ...HEADING, text: `${subject}, continued` }
  canvas.artifact(() => canvas.set(styled, LEFT, canvas.y, RIGHT - LEFT), 'Pagination')
  canvas.y += canvas.heightOf(styled, RIGHT - LEFT) + 2
}

/** Columns are separated by a gutter on the right of all but the last. */
function textWidth<Row>(columns: readonly Column<Row>[], index: number): number {
  const width = columns[index]?.width ?? 0
  return index === columns.length - 1 ? width : width - GUTTER
}

function headingHeight<Row>(canvas: Canvas, columns: readonly Column<Row>[]): number {
  const heights = columns.map(({ heading }, index) =>
    canvas.heightOf({ ...HEADING, text: heading }, textWidth(columns, index)),
  )
  return Math.max(...heights) + 2 * HEADING_PADDING
}

/** With a table element the headings enter the structure; without, they are a repetition for the eye. */
function drawHeadings<Row>(
  canvas: Canvas,
  columns: readonly Column<Row>[],
  element?: PDFKit.PDFStructureElement,
): void {
  const height = headingHeight(canvas, columns)
  const row = element ? canvas.element('TR', element) : undefined
  forEachColumn(columns, ({ heading, align }, x, width) => {
    const styled = { ...HEADING, text: heading, align }
    const y = canvas.y + height - HEADING_PADDING - canvas.heightOf(styled, width)
    const draw = (): void => canvas.set(styled, x, y, width)
    if (row) canvas.content('TH', draw, row, { scope: 'Column' })
    else canvas.artifact(draw, 'Pagination')
  })
  row?.end()
  canvas.y += height
  canvas.rule(canvas.y, { weight: 0.75, colour: COLOURS.slate, from: LEFT, to: RIGHT })
}

function drawRow<Row>(
  canvas: Canvas,
  columns: readonly Column<Row>[],
  { cells, padding, ascent, height }: MeasuredRow,
  element: PDFKit.PDFStructureElement,
): void {
  const row = canvas.element('TR', element)
  forEachColumn(columns, ({ align }, x, width, index) => {
    canvas.content(
      'TD',
      () => {
        const pieces = cells[index] ?? []
        let y = canvas.y + padding + ascent - firstAscent(canvas, pieces)
        for (const piece of pieces) {
          canvas.set({ ...piece, align }, x, y, width)
          y += canvas.heightOf(piece, width)
        }
      },
      row,
    )
  })
  row.end()
  canvas.y += height
}

function forEachColumn<Row>(
  columns: readonly Column<Row>[],
  draw: (column: Column<Row>, x: number, width: number, index: number) => void,
): void {
  let x: number = LEFT
  for (const [index, column] of columns.entries()) {
    draw(column, x, textWidth(columns, index), index)
    x += column.width
  }
}
