import { ChevronLeft, ChevronRight } from 'lucide-react'
import { formatCount } from '../lib/format.ts'
import { Button } from './button.tsx'

export type PaginationProps = {
  page: number
  pageSize: number
  total: number
  onPageChange: (page: number) => void
  onPageSizeChange?: (pageSize: number) => void
  /** What is counted: "detections". */
  noun: string
}

const pageSizes = [25, 50, 100, 200] as const

export function Pagination({ page, pageSize, total, onPageChange, onPageSizeChange, noun }: PaginationProps) {
  const lastPage = Math.max(1, Math.ceil(total / pageSize))
  const first = total === 0 ? 0 : (page - 1) * pageSize + 1
  const last = Math.min(total, page * pageSize)
  return (
    <nav aria-label={`Pages of ${noun}`} className="flex flex-wrap items-center justify-between gap-3 pt-3">
      <p className="text-slate" aria-live="polite">
        <span className="figures text-ink">
          {formatCount(first)}–{formatCount(last)}
        </span>{' '}
        of <span className="figures text-ink">{formatCount(total)}</span> {noun}
      </p>
      <div className="flex flex-wrap items-center gap-2">
        {onPageSizeChange !== undefined && (
          <label className="flex items-center gap-2 text-sm text-slate">
            Rows a page
            <select
              className="field-box w-auto"
              value={pageSize}
              onChange={(event) => onPageSizeChange(Number(event.currentTarget.value))}
            >
              {pageSizes.map((size) => (
                <option key={size}>{size}</option>
              ))}
            </select>
          </label>
        )}
        <Button icon={ChevronLeft} disabled={page <= 1} onClick={() => onPageChange(page - 1)}>
          Previous page
        </Button>
        <span className="px-1 figures">
          {formatCount(page)} / {formatCount(lastPage)}
        </span>
        <Button icon={ChevronRight} disabled={page >= lastPage} onClick={() => onPageChange(page + 1)}>
          Next page
        </Button>
      </div>
    </nav>
  )
}
