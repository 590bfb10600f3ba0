import type { Database } from '@fieldfare/database'
import type { Knex } from 'knex'

const BATCH_ROWS = 1000

/**
 * Reads a result of any length a batch at a time through a cursor, so that memory stays small and all rows are of
 * one moment. The connection is given back when the reader ends, early or not.
 */
export async function* streamRows<Row>(database: Database, query: Knex.QueryBuilder): AsyncGenerator<Row> {
  const trx = await database.transaction(null, { readOnly: true })
  try {
    await trx.raw('declare exported_rows no scroll cursor for ?', [query])
    for (;;) {
      const { rows } = await trx.raw<{ rows: Row[] }>(`fetch ${BATCH_ROWS} from exported_rows`)
      yield* rows
      if (rows.length < BATCH_ROWS) return
    }
  } finally {
    await trx.rollback()
  }
}
