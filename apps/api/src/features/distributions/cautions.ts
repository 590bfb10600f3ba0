import type { StationCoverage } from '../../records/coverage.repository.ts'
import type { LogReadiness, Unsettled } from './readiness.repository.ts'

export type CautionFacts = { coverage: readonly StationCoverage[]; logs: LogReadiness; unsettled: Unsettled }

function counted(count: number, one: string, many: string): string[] {
  if (count === 0) return []
  return [count === 1 ? `1 ${one}` : `${count} ${many}`]
}

/** Rounded down, so that a gap never reads as 100 %. */
function percent(part: number, whole: number): string {
  return `${(Math.floor((part / whole) * 1000) / 10).toFixed(1)} %`
}

/** Half a second is rounding of the recorder, not a gap. */
const GAP_SECONDS = 0.5

function coverageCautions(coverage: readonly StationCoverage[]): string[] {
  return coverage.flatMap(({ callName, heldSeconds, expectedSeconds }) => {
    if (expectedSeconds === 0) return [`${callName} sent logs but has no licence in this month.`]
    if (heldSeconds >= expectedSeconds - GAP_SECONDS) return []
    return [`${callName}: logs cover ${percent(heldSeconds, expectedSeconds)} of the month.`]
  })
}

/** What a careful person would settle first, most general first. */
export function cautionsFor({ coverage, logs, unsettled }: CautionFacts): string[] {
  return [
    ...coverageCautions(coverage),
    ...counted(logs.failed, 'station log could not be analysed.', 'station logs could not be analysed.'),
    ...counted(
      unsettled.waiting,
      'detection waits for review and is not counted.',
      'detections wait for review and are not counted.',
    ),
    ...counted(unsettled.openDisputes, 'dispute is open.', 'disputes are open.'),
    ...counted(
      unsettled.incompleteRecordings,
      'recording was played whose shares do not come to 100 %; what nobody can claim is held back.',
      'recordings were played whose shares do not come to 100 %; what nobody can claim is held back.',
    ),
  ]
}
