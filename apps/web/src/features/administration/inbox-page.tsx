import type { EndpointOutput, listInbox } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { PageHeader } from '../../components/page-header.tsx'
import { Pagination } from '../../components/pagination.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { classNames } from '../../lib/class-names.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { inboxQuery } from './administration-queries.ts'
import { MailText } from './mail-text.tsx'

type MailMessage = EndpointOutput<typeof listInbox>['items'][number]

export function InboxPage() {
  const search = useListSearch({ filters: [], pageSize: 25 })
  const inbox = useQuery(inboxQuery(search.query))
  return (
    <>
      <PageHeader
        title="Inbox"
        lead="No mail leaves this installation: every e-mail it would have sent is kept here, newest first."
      />
      <QueryState query={inbox} loading="Fetching the mail">
        {({ items, total }) =>
          items.length === 0 ? (
            <EmptyState title="No mail yet">
              Invitations, password resets, issued statements and answers to disputes appear here.
            </EmptyState>
          ) : (
            <div className="grid gap-4">
              <MailReader items={items} />
              <Pagination
                page={search.page}
                pageSize={search.pageSize}
                total={total}
                noun="messages"
                onPageChange={search.setPage}
                onPageSizeChange={search.setPageSize}
              />
            </div>
          )
        }
      </QueryState>
    </>
  )
}

/** Messages on the left, the chosen one beside them; one below the other on narrow screens. */
function MailReader({ items }: { items: readonly MailMessage[] }) {
  const [chosenId, setChosenId] = useState<string | null>(null)
  const chosen = items.find(({ id }) => id === chosenId) ?? items[0]
  return (
    <div className="grid items-start gap-8 lg:grid-cols-[minmax(18rem,2fr)_minmax(0,3fr)]">
      <ul aria-label="Messages" className="divide-y divide-hairline border-y border-ink">
        {items.map((message) => (
          <li key={message.id}>
            <button
              type="button"
              aria-pressed={message === chosen}
              onClick={() => setChosenId(message.id)}
              className={classNames(
                'block w-full border-l-4 px-3 py-2 text-left -outline-offset-2! hover:bg-band',
                message === chosen ? 'border-chestnut bg-band-strong' : 'border-transparent',
              )}
            >
              <span className="block font-semibold break-words">{message.subject}</span>
              <span className="flex flex-wrap justify-between gap-x-4 text-sm text-slate">
                <span className="break-all">{message.to}</span>
                <SocietyTime instant={message.createdAt} />
              </span>
            </button>
          </li>
        ))}
      </ul>
      {chosen !== undefined && <Message message={chosen} />}
    </div>
  )
}

function Message({ message }: { message: MailMessage }) {
  return (
    <article aria-label={message.subject} className="min-w-0 border-t border-ink pt-3">
      <h2 className="break-words">{message.subject}</h2>
      <p className="mb-4 border-b border-hairline pb-3 text-sm text-slate">
        To <span className="break-all">{message.to}</span>, <SocietyTime instant={message.createdAt} />
      </p>
      <MailText text={message.text} />
    </article>
  )
}
