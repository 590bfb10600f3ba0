import type { Connection } from '../connection.ts'

export type Society = { name: string; currency: string; currencyDigits: number; timeZone: string }

/** The one society this installation works for. The first migration makes its row, so there always is one. */
export async function readSociety(connection: Connection): Promise<Society> {
  const row: Society | undefined = await connection('society').first(
    'name',
    'currency',
    { currencyDigits: 'currency_digits' },
    { timeZone: 'time_zone' },
  )
  if (row === undefined) throw new Error('The society has no row; run the migrations.')
  return row
}
