import { monthStatusLabels, type Month, type MonthStatus } from '@fieldfare/contracts'
import { AppError } from '../http/app-error.ts'

/** `consequence` is a sentence: what cannot be done, or what to do instead. */
export function monthClosed(month: Month, status: MonthStatus, consequence: string): AppError {
  return new AppError('month-closed', {
    detail: `${month} is not open (${monthStatusLabels[status].toLowerCase()}). ${consequence}`,
  })
}
