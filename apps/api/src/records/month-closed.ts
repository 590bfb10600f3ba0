import type { Month, MonthStatus } from '@fieldfare/contracts'
import { AppError } from '../http/app-error.ts'
import { monthInWords } from './months.ts'

const whatNow = {
  open: '',
  calculating: 'It is being calculated. Wait until that has ended, then return it to open.',
  calculated: 'It is calculated. Return it to open first.',
  approved: 'It is approved. Return it to open first.',
  issuing:
    'Its statements are being made. A correction belongs to a later month and cannot be booked in this version.',
  issued: 'It is issued. A correction belongs to a later month and cannot be booked in this version.',
} as const satisfies Record<MonthStatus, string>

/** Plays of a month that is not open stand still; says what can be done about it. */
export function monthClosed(month: Month, status: MonthStatus): AppError {
  return new AppError('month-closed', {
    detail: `The plays of ${monthInWords(month)} cannot be changed. ${whatNow[status]}`,
  })
}
