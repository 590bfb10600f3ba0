import PDFDocument from 'pdfkit'
import { BOTTOM, COLOURS, LEFT, RIGHT, TOP, WIDTH } from './page-layout.ts'
import { type Face, faceAscent, faceBytes, FACES, makeSettable } from './typefaces.ts'

/** How a piece of text looks. */
export type TextStyle = {
  readonly face: Face
  readonly size: number
  readonly colour?: string
  readonly align?: 'left' | 'right'
}

/** A piece of text in its style. */
export type StyledText = TextStyle & { readonly text: string }

export type CanvasOptions = {
  readonly title: string
  readonly author: string
  readonly subject: string
  readonly createdAt: Date
}

type StructureOptions = PDFKit.Mixins.StructureElementOptions & { scope?: 'Column' | 'Row' }

const HAIRLINE: string = COLOURS.hairline

/** Extra space between the lines of a paragraph, in parts of the type size. */
const LEADING = 0.16

/**
 * A document under construction: a place on the page that moves down, text measured before it is set, and the
 * structure tree that goes with what is drawn. Nothing breaks over a page by itself; callers reserve room first.
 */
export class Canvas {
  readonly pdf: PDFKit.PDFDocument
  y = TOP
  /** Whether a letter had to be replaced because no face holds it. */
  lostLetters = false
  private readonly root: PDFKit.PDFStructureElement

  constructor({ title, author, subject, createdAt }: CanvasOptions) {
    this.pdf = new PDFDocument({
      size: 'A4',
      // No automatic page breaks: they would come between a row's cells.
      margins: { top: 0, bottom: 0, left: 0, right: 0 },
      bufferPages: true,
      pdfVersion: '1.7',
      lang: 'en-GB',
      tagged: true,
      displayTitle: true,
      info: {
        Title: title,
        Author: author,
        Subject: subject,
        Creator: 'Fieldfare',
        Producer: 'Fieldfare',
        CreationDate: createdAt,
      },
    })
    for (const face of FACES) this.pdf.registerFont(face, faceBytes(face))
    this.root = this.pdf.struct('Document')
    this.pdf.addStructure(this.root)
  }

  /** Starts a page when less than `height` is left on this one. Says whether it did. */
  reserve(height: number): boolean {
    if (this.y + height <= BOTTOM) return false
    this.newPage()
    return true
  }

  newPage(): void {
    this.pdf.addPage()
    this.y = TOP
  }

  /** An element of the structure tree under `parent`, or under the document. */
  element(
    type: string,
    parent: PDFKit.PDFStructureElement = this.root,
    options: StructureOptions = {},
  ): PDFKit.PDFStructureElement {
    const element = this.pdf.struct(type, options)
    parent.add(element)
    return element
  }

  /** Draws something that carries meaning, as the content of a new element. */
  content(
    type: string,
    draw: () => void,
    parent: PDFKit.PDFStructureElement = this.root,
    options: StructureOptions = {},
  ): void {
    const element = this.element(type, parent, options)
    element.add(draw)
    element.end()
  }

  /** Draws something a reader of the structure should not hear of. */
  artifact(draw: () => void, type: 'Pagination' | 'Layout' = 'Layout'): void {
    this.pdf.markContent('Artifact', { type })
    draw()
    this.pdf.endMarkedContent()
  }

  rule(y: number, { weight = 0.5, colour = HAIRLINE, from = LEFT, to = RIGHT } = {}): void {
    this.artifact(() => {
      this.pdf.lineWidth(weight).moveTo(from, y).lineTo(to, y).stroke(colour)
    })
  }

  heightOf(styled: StyledText, width: number): number {
    const { text } = this.prepare(styled)
    return this.pdf.heightOfString(text, { width, lineGap: styled.size * LEADING })
  }

  widthOf(styled: StyledText): number {
    return this.pdf.widthOfString(this.prepare(styled).text)
  }

  /** The text cut to one line of the width, with an ellipsis where something was cut off. */
  shorten(styled: StyledText, width: number): StyledText {
    if (this.widthOf(styled) <= width) return styled
    const letters = Array.from(styled.text)
    let kept = letters.length - 1
    const cut = (): StyledText => ({ ...styled, text: `${letters.slice(0, kept).join('').trimEnd()}…` })
    while (kept > 0 && this.widthOf(cut()) > width) kept -= 1
    return cut()
  }

  /** How far the baseline of the first line lies below the top of the text. */
  ascentOf({ text, face, size }: StyledText): number {
    return faceAscent(makeSettable(text, face).face) * size
  }

  /** Sets text so that its first line stands on the baseline. */
  setOnBaseline(styled: StyledText, x: number, baseline: number, width: number): void {
    this.set(styled, x, baseline - this.ascentOf(styled), width)
  }

  /** Sets text with its top left corner at x, y. */
  set(styled: StyledText, x: number, y: number, width: number): void {
    const { text } = this.prepare(styled)
    this.pdf
      .fillColor(styled.colour ?? COLOURS.ink)
      .text(text, x, y, { width, align: styled.align ?? 'left', lineGap: styled.size * LEADING })
  }

  /** A paragraph over the whole width, at the current place. */
  paragraph(styled: StyledText, { type = 'P', width = WIDTH, after = 6 } = {}): void {
    const height = this.heightOf(styled, width)
    this.reserve(height)
    this.content(type, () => this.set(styled, LEFT, this.y, width))
    this.y += height + after
  }

  /** Draws on every page once all pages are there, then gives the finished file. */
  async finish(drawOnPage: (page: number, pages: number) => void): Promise<Buffer> {
    this.root.end()
    const { count } = this.pdf.bufferedPageRange()
    for (let index = 0; index < count; index += 1) {
      this.pdf.switchToPage(index)
      this.artifact(() => drawOnPage(index + 1, count), 'Pagination')
    }
    const chunks: Uint8Array[] = []
    const done = new Promise<Buffer>((resolve, reject) => {
      this.pdf.on('data', (chunk: Uint8Array) => chunks.push(chunk))
      this.pdf.on('end', () => resolve(Buffer.concat(chunks)))
      this.pdf.on('error', reject)
    })
    this.pdf.end()
    return done
  }

  private prepare({ text, face, size }: StyledText): { text: string } {
    const settable = makeSettable(text, face)
    this.lostLetters ||= settable.lostLetters
    this.pdf.font(settable.face).fontSize(size)
    return settable
  }
}
