import { describe, expect, it } from 'vitest'
import { changeListSearch, readListState } from './list-search.ts'

const options = { filters: ['status', 'month'], sort: '-startedAt' } as const

describe('readListState', () => {
  it('takes page, sort and filters from the address', () => {
    const search = new URLSearchParams('page=3&sort=station&status=failed&other=1')

    expect(readListState(search, options)).toEqual({
      page: 3,
      pageSize: 50,
      sort: 'station',
      filters: { status: 'failed', month: '' },
    })
  })

  it.each(['0', '-1', 'two', '1.5', ''])('takes page "%s" for the first', (page) => {
    expect(readListState(new URLSearchParams({ page }), options).page).toBe(1)
  })

  it('never asks for more rows than the server gives', () => {
    expect(readListState(new URLSearchParams('pageSize=5000'), options).pageSize).toBe(50)
  })
})

describe('changeListSearch', () => {
  const search = new URLSearchParams('page=3&status=failed')

  it('goes back to the first page when a filter changes', () => {
    expect(changeListSearch(search, { status: 'queued' }).toString()).toBe('status=queued')
  })

  it('keeps the filters when the page changes', () => {
    expect(changeListSearch(search, { page: '4' }).toString()).toBe('page=4&status=failed')
  })

  it('drops a filter that was emptied', () => {
    expect(changeListSearch(search, { status: '' }).toString()).toBe('')
  })
})
