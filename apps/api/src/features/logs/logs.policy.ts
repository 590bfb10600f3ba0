import type { LogStatus, MonthStatus } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'

/** Only what was read once, or failed for reasons of ours, is worth another run; its plays must be free to change. */
export function canAnalyseAgain(
  actor: Pick<Actor, 'role'>,
  log: { status: LogStatus; isAudioKept: boolean; monthStatus: MonthStatus },
): boolean {
  return (
    actor.role === 'clerk' &&
    (log.status === 'analysed' || log.status === 'failed') &&
    log.isAudioKept &&
    log.monthStatus === 'open'
  )
}
