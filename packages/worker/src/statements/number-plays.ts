import { type StatementDocument, type StatementLine, type StatementPlay } from './statement-document.ts'

/** A play with the short number it has within one statement. */
export type NumberedPlay = StatementPlay & {
  readonly number: number
  readonly stationName: string
  readonly timeZone: string
}

/** The plays of a statement, numbered from 1 in the order in which its lines first name them. */
export type PlayNumbers = {
  readonly plays: readonly NumberedPlay[]
  /** The numbers of a line's plays, ascending. */
  readonly of: (line: StatementLine) => readonly number[]
}

/** A play is numbered once, however many lines it appears in. */
export function numberPlays(statement: StatementDocument): PlayNumbers {
  const numbered = new Map<string, NumberedPlay>()
  for (const { stationName, timeZone, lines } of statement.sections) {
    for (const play of lines.flatMap((line) => line.plays)) {
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

/** Numbers as ranges, for print: `1–4, 9`. */
export function formatNumbers(numbers: readonly number[]): string {
  const ranges: { first: number; last: number }[] = []
  for (const number of numbers) {
    const range = ranges.at(-1)
    if (range?.last === number - 1) range.last = number
    else ranges.push({ first: number, last: number })
  }
  return ranges.map(({ first, last }) => (first === last ? `${first}` : `${first}–${last}`)).join(', ')
}
