import type { DemoSignIn } from './demo.ts'

export type Announcement = {
  readonly address: string
  readonly dataDirectory: string
  readonly logDirectory: string
  readonly signIns: readonly DemoSignIn[]
  readonly elapsedMs: number
}

/** What a person needs to know once everything runs. */
export function announce({ address, dataDirectory, logDirectory, signIns, elapsedMs }: Announcement): string {
  const rows = signIns.map(({ role, email, password }) => [role, email, password])
  return [
    '',
    `Fieldfare is ready (after ${formatDuration(elapsedMs)}):  ${address}`,
    '',
    ...(rows.length === 0 ? [] : [...formatTable([['role', 'sign in with', 'password'], ...rows]), '']),
    `Data: ${dataDirectory}   Logs: ${logDirectory}   Ctrl-C stops everything.`,
  ].join('\n')
}

/** Columns as wide as their widest cell, two blanks apart and indented by two. */
export function formatTable(rows: readonly (readonly string[])[]): readonly string[] {
  const widths: number[] = []
  for (const row of rows) {
    row.forEach((cell, column) => (widths[column] = Math.max(widths[column] ?? 0, cell.length)))
  }
  return rows.map((row) =>
    `  ${row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`.trimEnd(),
  )
}

export function formatDuration(durationMs: number): string {
  const seconds = durationMs / 1000
  if (seconds < 60) return `${seconds.toFixed(1)} s`
  return `${Math.floor(seconds / 60)} min ${String(Math.floor(seconds % 60)).padStart(2, '0')} s`
}
