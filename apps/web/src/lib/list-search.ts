import { useSearchParams } from 'react-router'

export type ListSearchOptions<Name extends string> = {
  /** Filter names as they stand in the address and in the endpoint's query. */
  filters: readonly Name[]
  sort?: string
  pageSize?: number
}

export type ListSearch<Name extends string = string> = {
  page: number
  pageSize: number
  sort: string
  filters: Record<Name, string>
  hasFilters: boolean
  /** Ready for callApi's `query`: page, pageSize, sort and every filter that is set. */
  query: Partial<Record<Name | 'page' | 'pageSize' | 'sort', string | number>>
  /** The same without paging, for the CSV export of exactly what is listed. */
  exportQuery: Partial<Record<Name | 'sort', string>>
  setPage: (page: number) => void
  setPageSize: (pageSize: number) => void
  setSort: (sort: string) => void
  setFilter: (name: Name, value: string) => void
  clearFilters: () => void
}

export type ListState<Name extends string> = Pick<ListSearch<Name>, 'page' | 'pageSize' | 'sort' | 'filters'>

const MAXIMUM_PAGE_SIZE = 200

function readWhole(text: string | null, fallback: number, maximum: number): number {
  const value = Number(text)
  return text !== null && Number.isInteger(value) && value >= 1 && value <= maximum ? value : fallback
}

function recordOf<Name extends string>(
  names: readonly Name[],
  valueOf: (name: Name) => string,
): Record<Name, string>
function recordOf(names: readonly string[], valueOf: (name: string) => string): Record<string, string> {
  return Object.fromEntries(names.map((name) => [name, valueOf(name)]))
}

/** What the address says about a list; nonsense falls back to the start of the list. */
export function readListState<Name extends string>(
  search: URLSearchParams,
  options: ListSearchOptions<Name>,
): ListState<Name> {
  return {
    page: readWhole(search.get('page'), 1, 100_000),
    pageSize: readWhole(search.get('pageSize'), options.pageSize ?? 50, MAXIMUM_PAGE_SIZE),
    sort: search.get('sort') ?? options.sort ?? '',
    filters: recordOf(options.filters, (name) => search.get(name) ?? ''),
  }
}

/** Changes the address; every change but that of the page itself starts again at page one. */
export function changeListSearch(search: URLSearchParams, changes: Record<string, string>): URLSearchParams {
  const next = new URLSearchParams(search)
  if (!('page' in changes)) next.delete('page')
  for (const [name, value] of Object.entries(changes)) {
    if (value === '' || (name === 'page' && value === '1')) next.delete(name)
    else next.set(name, value)
  }
  return next
}

function present<Key extends string, Value extends string | number>(
  entries: Record<Key, Value>,
): Partial<Record<Key, Value>>
function present(entries: Record<string, string | number>): Record<string, string | number> {
  return Object.fromEntries(Object.entries(entries).filter(([, value]) => value !== ''))
}

/** Page, sort and filters of a list, kept in the address bar so that a view can be linked, reloaded and gone back to. */
export function useListSearch<const Name extends string>(options: ListSearchOptions<Name>): ListSearch<Name> {
  const [search, setSearch] = useSearchParams()
  const state = readListState(search, options)
  const change = (changes: Record<string, string>, replace = true) =>
    setSearch((current) => changeListSearch(current, changes), { replace, preventScrollReset: true })
  const criteria: Record<Name | 'sort', string> = { ...state.filters, sort: state.sort }

  return {
    ...state,
    hasFilters: options.filters.some((name) => state.filters[name] !== ''),
    query: present<Name | 'page' | 'pageSize' | 'sort', string | number>({
      ...criteria,
      page: state.page,
      pageSize: state.pageSize,
    }),
    exportQuery: present<Name | 'sort', string>(criteria),
    setPage: (page) => change({ page: String(page) }, false),
    setPageSize: (pageSize) => change({ pageSize: String(pageSize) }),
    setSort: (sort) => change({ sort }),
    setFilter: (name, value) => change({ [name]: value }),
    clearFilters: () => change(recordOf(options.filters, () => '')),
  }
}
