import type { MonthStatus, ProblemCode } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import type { RunRow } from './distribution-state.repository.ts'

/** Why a step cannot be taken, with the problem it would end in. */
export type Refusal = { code: ProblemCode; reason: string }

export type MonthState = {
  status: MonthStatus
  run: Pick<RunRow, 'requestedBy' | 'requestedByName'> | null
  isOver: boolean
  logsInWork: number
  /** Why the statements could not be made, when that failed. */
  issueFailure: string | null
}

type Asker = Pick<Actor, 'userId' | 'role'>
type Step = (state: MonthState, actor: Asker) => Refusal | null

const clerksOnly: Refusal = { code: 'not-allowed', reason: 'Clerks take this step.' }

const conflict = (reason: string): Refusal => ({ code: 'conflict', reason })

const statusWords = {
  open: 'The month has not been calculated yet.',
  calculating: 'The month is being calculated.',
  calculated: 'The month is not approved yet.',
  approved: 'The month is approved already. Return it to open to calculate it again.',
  issuing: 'The statements are being made.',
  issued: 'The month is issued and does not change any more.',
} as const satisfies Record<MonthStatus, string>

function isOneOf(status: MonthStatus, allowed: readonly MonthStatus[]): boolean {
  return allowed.includes(status)
}

export const refuseCalculation: Step = ({ status, isOver, logsInWork }, actor) => {
  if (actor.role !== 'clerk') return clerksOnly
  if (!isOneOf(status, ['open', 'calculated'])) return conflict(statusWords[status])
  if (!isOver) return conflict('The month is not over at every station yet.')
  if (logsInWork > 0) {
    return conflict(
      logsInWork === 1
        ? '1 station log of the month is still being analysed.'
        : `${logsInWork} station logs of the month are still being analysed.`,
    )
  }
  return null
}

/** Four eyes: whoever calculated a month never approves it. */
export const refuseApproval: Step = ({ status, run }, actor) => {
  if (actor.role !== 'clerk') return clerksOnly
  if (status === 'approved') return conflict('The month is approved already.')
  if (status !== 'calculated' || run === null) return conflict(statusWords[status])
  if (run.requestedBy === actor.userId) {
    return {
      code: 'second-person-needed',
      reason: 'You calculated this month yourself; another clerk must approve it.',
    }
  }
  return null
}

/** Making the statements may be asked for again where it failed: nothing has been opened to anyone yet. */
export const refuseIssue: Step = ({ status, issueFailure }, actor) => {
  if (actor.role !== 'clerk') return clerksOnly
  if (status === 'issuing' && issueFailure !== null) return null
  if (status !== 'approved') return conflict(statusWords[status])
  return null
}

export const refuseReopening: Step = ({ status }, actor) => {
  if (actor.role !== 'clerk') return clerksOnly
  if (status === 'open') return conflict('The month is open.')
  if (!isOneOf(status, ['calculated', 'approved'])) return conflict(statusWords[status])
  return null
}
