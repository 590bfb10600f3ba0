import { containsPattern, type Transaction } from '@fieldfare/database'

/**
 * The key of the next job about the same thing: `analyse-log-<id>-2` after `analyse-log-<id>-1`. Lock the thing first,
 * so that two people asking at once are counted one after the other.
 */
export async function nextDedupeKey(trx: Transaction, stem: string): Promise<string> {
  const prefixPattern = `${containsPattern(stem).slice(1, -1)}-%`
  const row: { jobs: number } | undefined = await trx('jobs')
    .where('dedupe_key', 'like', prefixPattern)
    .first(trx.raw('count(*)::int as jobs'))
  return `${stem}-${(row?.jobs ?? 0) + 1}`
}
