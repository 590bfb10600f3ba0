import type { Knex } from 'knex'
import type { Connection } from './connection.ts'

export type PageRequest = { page: number; pageSize: number }
export type PageResult<Row> = { items: Row[]; total: number; page: number; pageSize: number }

/** Column names people may sort by, and the SQL expression behind each. Expressions come from code, never from a request. */
export type SortColumns = Readonly<Record<string, string>>

export type SortOrder = { expression: string; direction: 'asc' | 'desc' }

/**
 * Reads `title` or `-title` against the whitelist.
 *
 * @throws RangeError for a column that is not in it; contracts refuse those first, with `sortSchema`.
 */
export function sortOrder(columns: SortColumns, sort: string): SortOrder {
  const direction = sort.startsWith('-') ? 'desc' : 'asc'
  const name = direction === 'desc' ? sort.slice(1) : sort
  const expression = Object.hasOwn(columns, name) ? columns[name] : undefined
  if (expression === undefined) throw new RangeError(`Not a column to sort by: ${name}`)
  return { expression, direction }
}

/** Sorts, empty values last, with a unique column behind it so that pages never overlap. */
export function applySort<Builder extends Knex.QueryBuilder>(
  query: Builder,
  columns: SortColumns,
  sort: string,
  tieBreaker: string,
): Builder {
  const { expression, direction } = sortOrder(columns, sort)
  query.orderByRaw(`${expression} ${direction} nulls last, ${tieBreaker} ${direction}`)
  return query
}

/** Knex knows no row types once a query has passed a function; the caller of `fetchPage` names them. */
async function fetchRows<Row>(query: PromiseLike<Row[]>): Promise<Row[]> {
  const rows = await query
  return rows
}

/**
 * Runs a filtered, sorted query for one page and counts the whole. Two queries; the count ignores the sort.
 *
 * @param query - selects mapped columns, without limit or offset
 */
export async function fetchPage<Row>(
  connection: Connection,
  query: Knex.QueryBuilder,
  request: PageRequest,
): Promise<PageResult<Row>> {
  const [counted] = await connection
    .from(query.clone().clearOrder().as('counted'))
    .select<{ total: bigint }[]>(connection.raw('count(*) as total'))
  const items = await fetchRows<Row>(
    query
      .clone()
      .limit(request.pageSize)
      .offset((request.page - 1) * request.pageSize),
  )
  return { items, total: Number(counted?.total ?? 0n), page: request.page, pageSize: request.pageSize }
}

/** Escapes what a person typed for `ilike`, and looks for it anywhere. */
export function containsPattern(text: string): string {
  return `%${text.replaceAll(/[\\%_]/g, (character) => `\\${character}`)}%`
}
