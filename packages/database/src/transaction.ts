import { z } from 'zod'
import type { Database, Transaction } from './connection.ts'
import { translateDatabaseError } from './constraint-violation.ts'

const retryableSchema = z.object({ code: z.enum(['40001', '40P01']) })
const ATTEMPTS = 4

export type TransactionOptions = {
  isolation?: 'read committed' | 'repeatable read' | 'serializable'
}

/**
 * Runs `work` in one transaction: committed when it returns, rolled back when it throws.
 * Deadlocks and serialization failures run it again, up to four times in all, so `work` must touch nothing
 * but the transaction.
 *
 * @throws ConstraintViolation where PostgreSQL refused a row.
 */
export async function inTransaction<Result>(
  database: Database,
  work: (trx: Transaction) => Promise<Result>,
  options: TransactionOptions = {},
): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await database.transaction(work, { isolationLevel: options.isolation ?? 'read committed' })
    } catch (error) {
      const isRetryable = retryableSchema.safeParse(error).success
      if (!isRetryable || attempt === ATTEMPTS) throw translateDatabaseError(error)
    }
  }
}
