import { Fragment, type ReactNode } from 'react'

export type Definition = { term: ReactNode; value: ReactNode }

/** Facts of one thing, term beside value; stacked on narrow screens. */
export function DefinitionList({ items }: { items: readonly (Definition | null)[] }) {
  return (
    <dl className="grid grid-cols-1 sm:grid-cols-[minmax(9rem,max-content)_1fr]">
      {items.map((item, index) =>
        item === null ? null : (
          // The order of the facts of a thing never changes while it is shown.
          <Fragment key={index}>
            <dt className="border-hairline pt-2 overline-label sm:border-b sm:py-2 sm:pr-6 sm:leading-6">
              {item.term}
            </dt>
            <dd className="min-w-0 border-b border-hairline pb-2 break-words sm:py-2">{item.value}</dd>
          </Fragment>
        ),
      )}
    </dl>
  )
}

export type KeyFigure = { label: string; value: ReactNode; detail?: ReactNode }

/** A few headline figures in one ruled row. */
export function KeyFigures({ items }: { items: readonly KeyFigure[] }) {
  return (
    <dl className="grid grid-cols-2 border-y border-ink sm:flex sm:flex-wrap">
      {items.map((item) => (
        <div
          key={item.label}
          className="grow border-hairline px-4 py-3 not-first:border-l max-sm:nth-[odd]:border-l-0"
        >
          <dt className="overline-label">{item.label}</dt>
          <dd className="mt-0.5 font-serif text-2xl leading-tight [&_.figures]:font-[inherit] [&_.figures]:text-[1em]">
            {item.value}
          </dd>
          {item.detail !== undefined && <dd className="text-sm text-slate">{item.detail}</dd>}
        </div>
      ))}
    </dl>
  )
}
