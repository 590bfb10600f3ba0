import type { z } from 'zod'
import type { importRowOutcomeSchema } from '@fieldfare/contracts'

export type RowOutcome = z.infer<typeof importRowOutcomeSchema>

export type ReportedRow = {
  line: number
  isrc: string
  title: string
  outcome: RowOutcome
  messages: string[]
}

/** What became of each row so far. A row that is refused stays refused, and changes nothing. */
export class RowReport {
  readonly #rows = new Map<number, ReportedRow>()

  open(row: { line: number; isrc: string; title: string; messages: readonly string[] }): void {
    this.#rows.set(row.line, { ...row, outcome: 'unchanged', messages: [...row.messages] })
  }

  refuse(line: number, ...messages: string[]): void {
    const row = this.#row(line)
    row.outcome = 'refused'
    row.messages.push(...messages)
  }

  say(line: number, message: string): void {
    this.#row(line).messages.push(message)
  }

  /** Creating something outweighs changing something. */
  note(line: number, outcome: 'created' | 'updated'): void {
    const row = this.#row(line)
    if (row.outcome === 'unchanged' || (row.outcome === 'updated' && outcome === 'created'))
      row.outcome = outcome
  }

  isRefused(line: number): boolean {
    return this.#row(line).outcome === 'refused'
  }

  rows(): ReportedRow[] {
    return [...this.#rows.values()].sort((left, right) => left.line - right.line)
  }

  #row(line: number): ReportedRow {
    const row = this.#rows.get(line)
    if (row === undefined) throw new Error(`Line ${line} was never read`)
    return row
  }
}
