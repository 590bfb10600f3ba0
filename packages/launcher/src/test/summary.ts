import { formatDuration, formatTable } from '../start/announcement.ts'
import type { StepResult } from './run-steps.ts'

/** The closing table, and one line with the number of tests that continuous integration reads. */
export function summarise(results: readonly StepResult[], elapsedMs: number): string {
  const rows = results.map(({ name, passed, durationMs, counts }) => [
    name,
    passed ? 'passed' : 'FAILED',
    formatDuration(durationMs),
    counts === undefined ? '' : `${counts.passed} tests passed, ${counts.failed} failed`,
  ])
  const total = { passed: 0, failed: 0 }
  for (const { counts } of results) {
    total.passed += counts?.passed ?? 0
    total.failed += counts?.failed ?? 0
  }
  return [
    '',
    ...formatTable([['step', 'result', 'duration', ''], ...rows]),
    '',
    `All steps took ${formatDuration(elapsedMs)}.`,
    `${total.passed} passed, ${total.failed} failed`,
  ].join('\n')
}
