import { type StyledText } from './canvas.ts'
import { COLOURS } from './page-layout.ts'

/** Running text. */
export function body(text: string): StyledText {
  return { text, face: 'sans', size: 9.5 }
}

/** Running text that matters most in its row. */
export function strong(text: string): StyledText {
  return { text, face: 'sansStrong', size: 9.5 }
}

/** Remarks and second lines. */
export function small(text: string): StyledText {
  return { text, face: 'sans', size: 8, colour: COLOURS.slate }
}

/** Figures, right-aligned by their column: every digit is as wide as the next. */
export function figure(text: string): StyledText {
  return { text, face: 'mono', size: 8.75 }
}

/** A figure that closes a column. */
export function total(text: string): StyledText {
  return { text, face: 'monoStrong', size: 8.75 }
}

/** Codes and references. */
export function code(text: string): StyledText {
  return { text, face: 'mono', size: 7.5, colour: COLOURS.slate }
}
