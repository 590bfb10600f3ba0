import { ChevronRight } from 'lucide-react'
import type { ReactNode } from 'react'
import { Link } from 'react-router'
import { useDocumentTitle } from '../lib/document-title.ts'

export type Breadcrumb = { label: string; to: string }

export type PageHeaderProps = {
  title: string
  /** One sentence saying what the page is for or what it shows now. */
  lead?: ReactNode
  breadcrumbs?: readonly Breadcrumb[]
  /** Beside the title: status, code. */
  aside?: ReactNode
  actions?: ReactNode
}

/** Head of every page: where it is, its title (also of the browser tab), what it says, what can be done. */
export function PageHeader({ title, lead, breadcrumbs, aside, actions }: PageHeaderProps) {
  useDocumentTitle(title)
  return (
    <header className="mb-6 grid gap-2 border-b border-ink pb-4">
      {breadcrumbs !== undefined && <Breadcrumbs items={breadcrumbs} />}
      <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
        <div className="flex min-w-0 flex-wrap items-baseline gap-x-4 gap-y-1">
          <h1 className="min-w-0 break-words">{title}</h1>
          {aside}
        </div>
        {actions !== undefined && <div className="flex flex-wrap gap-2">{actions}</div>}
      </div>
      {lead !== undefined && <div className="max-w-[72ch] text-slate">{lead}</div>}
    </header>
  )
}

function Breadcrumbs({ items }: { items: readonly Breadcrumb[] }) {
  return (
    <nav aria-label="Where this page is">
      <ol className="flex flex-wrap items-center gap-1 text-sm">
        {items.map((item) => (
          <li key={item.to} className="flex items-center gap-1">
            <Link to={item.to} className="link">
              {item.label}
            </Link>
            <ChevronRight aria-hidden className="size-3.5 text-slate" />
          </li>
        ))}
      </ol>
    </nav>
  )
}

export type SectionProps = { title: string; lead?: ReactNode; actions?: ReactNode; children: ReactNode }

/** A titled part of a page; hairlines and room separate parts, not boxes. */
export function Section({ title, lead, actions, children }: SectionProps) {
  return (
    <section className="mt-10 first:mt-0">
      <div className="mb-3 flex flex-wrap items-end justify-between gap-3 border-b border-hairline pb-1.5">
        <div>
          <h2>{title}</h2>
          {lead !== undefined && <p className="max-w-[72ch] text-slate">{lead}</p>}
        </div>
        {actions !== undefined && <div className="flex flex-wrap gap-2">{actions}</div>}
      </div>
      {children}
    </section>
  )
}
