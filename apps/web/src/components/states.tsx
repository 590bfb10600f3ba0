import { RotateCw } from 'lucide-react'
import type { ReactNode } from 'react'
import { describeFailure } from '../lib/api-problem.ts'
import { Button } from './button.tsx'
import { Notice } from './notice.tsx'

export type EmptyStateProps = {
  title: string
  /** Why there is nothing and what would change that. */
  children?: ReactNode
  action?: ReactNode
}

export function EmptyState({ title, children, action }: EmptyStateProps) {
  return (
    <div className="grid justify-items-start gap-2 border-y border-hairline px-4 py-8">
      <p className="font-serif text-xl">{title}</p>
      {children !== undefined && <div className="max-w-prose text-slate">{children}</div>}
      {action !== undefined && <div className="mt-2 flex flex-wrap gap-2">{action}</div>}
    </div>
  )
}

export type ErrorStateProps = {
  error: unknown
  onRetry?: () => void
  /** Another way out, such as a link back to the list. */
  action?: ReactNode
}

export function ErrorState({ error, onRetry, action }: ErrorStateProps) {
  const { title, detail, reference } = describeFailure(error)
  return (
    <Notice
      tone="bad"
      announce
      title={title}
      actions={
        <>
          {onRetry !== undefined && (
            <Button icon={RotateCw} onClick={onRetry}>
              Try again
            </Button>
          )}
          {action}
        </>
      }
    >
      <p>{detail}</p>
      {reference !== null && (
        <p className="text-sm text-slate">
          Reference for the administrator: <span className="figures">{reference}</span>
        </p>
      )}
    </Notice>
  )
}

/** What is being waited for, in words; for work with a measurable length use ProgressBar. */
export function LoadingState({ children = 'Loading' }: { children?: ReactNode }) {
  return (
    <div role="status" className="flex items-center gap-3 px-1 py-8 text-slate">
      <span aria-hidden className="grid h-5 w-8 gap-1">
        <span className="h-1 w-full animate-pulse bg-slate" />
        <span className="h-1 w-2/3 animate-pulse bg-chestnut [animation-delay:150ms]" />
        <span className="h-1 w-5/6 animate-pulse bg-slate [animation-delay:300ms]" />
      </span>
      <span>{children}…</span>
    </div>
  )
}

type QueryLike<Data> = {
  data: Data | undefined
  error: Error | null
  refetch: () => unknown
}

/** The states of one query around its content: waiting, failed, there. Kept data stays visible while it is fetched anew. */
export function QueryState<Data>({
  query,
  loading,
  children,
}: {
  query: QueryLike<Data>
  loading?: ReactNode
  children: (data: Data) => ReactNode
}) {
  if (query.data !== undefined) return children(query.data)
  if (query.error !== null) return <ErrorState error={query.error} onRetry={() => void query.refetch()} />
  return <LoadingState>{loading}</LoadingState>
}
