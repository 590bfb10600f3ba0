import { type StatementDocument, type StatementLine, type StatementPlay } from './statement-document.ts'

/** A play with the short number it has within one statement. */
export type NumberedPlay = StatementPlay & {
  readonly number: number
  readonly stationName: string
  readonly timeZone: string
}

/** The plays of a statement, numbered from 1: station by station, within it by recording and then by time. */
export type PlayNumbers = {
  readonly plays: readonly NumberedPlay[]
  /** The numbers of a line's plays, ascending. */
  readonly of: (line: StatementLine) => readonly number[]
}

/**
 * A play is numbered once, however many lines it appears in. The plays of one recording have numbers in a row, so
 * that a line refers to them by few ranges.
 */
export function numberPlays(statement: StatementDocument): PlayNumbers {
  const numbered = new Map<string, NumberedPlay>()
  for (const { stationName, timeZone, lines } of statement.sections) {
    const plays = lines.flatMap((line) => line.plays).sort(comparePlays)
    for (const play of plays) {
      if (numbered.has(play.reference)) continue
      numbered.set(play.reference, { ...play, number: numbered.size + 1, stationName, timeZone })
    }
  }
  return {
    plays: [...numbered.values()],
    of: (line) =>
      line.plays
        .map(({ reference }) => numbered.get(reference)?.number ?? 0)
        .sort((left, right) => left - right),
  }
}

function comparePlays(left: StatementPlay, right: StatementPlay): number {
  const keyOf = ({ recordingTitle, localStart, reference }: StatementPlay): readonly string[] => [
    recordingTitle,
    localStart,
    reference,
  ]
  const rightKey = keyOf(right)
  for (const [index, text] of keyOf(left).entries()) {
    const other = rightKey[index] ?? ''
    if (text !== other) return text < other ? -1 : 1
  }
  return 0
}

/** Beyond so many ranges a list of numbers helps nobody on paper. */
const PRINTED_RANGES = 40

/** Ascending numbers as ranges, for print: `1–4, 9`. */
export function formatNumbers(numbers: readonly number[]): string {
  const ranges: { first: number; last: number }[] = []
  for (const number of numbers) {
    const range = ranges.at(-1)
    if (range?.last === number - 1) range.last = number
    else ranges.push({ first: number, last: number })
  }
  const printed = ranges
    .slice(0, PRINTED_RANGES)
    .map(({ first, last }) => (first === last ? `${first}` : `${first}–${last}`))
    .join(', ')
  return ranges.length > PRINTED_RANGES ? `${printed} and more; the CSV file lists all` : printed
}
