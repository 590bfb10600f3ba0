import { monthStatusLabels, type Month, type MonthStatus } from '@fieldfare/contracts'
import { AppError } from '../http/app-error.ts'
import { monthInWords } from '../records/months.ts'

/** `consequence` is a sentence: what cannot be done, or what to do instead. */
export function monthNotOpen(month: Month, status: MonthStatus, consequence: string): AppError {
  return new AppError('month-closed', {
    detail: `${monthInWords(month)} is not open (${monthStatusLabels[status].toLowerCase()}). ${consequence}`,
  })
}
