import { roleLabels, type UserView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { UserPlus } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SearchFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { usersQuery } from './administration-queries.ts'
import { UserStatusTag } from './user-status-tag.tsx'

const columns: readonly DataColumn<UserView>[] = [
  {
    id: 'name',
    header: 'Name',
    rowHeader: true,
    minWidth: '12rem',
    cell: (user) => (
      <>
        <TextLink to={`/users/${user.id}`}>{user.name}</TextLink>
        <span className="block text-sm text-slate">{user.email}</span>
      </>
    ),
  },
  { id: 'role', header: 'Role', cell: (user) => roleLabels[user.role] },
  { id: 'scope', header: 'Scope', minWidth: '14rem', cell: (user) => scopeInWords(user) },
  { id: 'status', header: 'State', cell: (user) => <UserStatusTag status={user.status} /> },
  {
    id: 'lastSignInAt',
    header: 'Last sign-in',
    cell: (user) =>
      user.lastSignInAt === null ? (
        <span className="text-slate">Never</span>
      ) : (
        <SocietyTime instant={user.lastSignInAt} />
      ),
  },
]

function scopeInWords({ role, stations, parties }: UserView): string {
  if (role === 'uploader') return stations.map(({ name }) => name).join(', ')
  if (role === 'publisher') return parties.map(({ name }) => name).join(', ')
  return 'The whole society'
}

export function UsersPage() {
  const search = useListSearch({ filters: ['search'] })
  const users = useQuery(usersQuery(search.query))
  return (
    <>
      <PageHeader
        title="Users"
        lead="Who may sign in, in which role, and for which stations or parties."
        actions={
          <LinkButton to="/users/new" tone="main" icon={UserPlus}>
            Invite a person
          </LinkButton>
        }
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Name or e-mail address"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
      </FilterBar>
      <DataTable
        name="users"
        caption="Users"
        captionHidden
        noun="users"
        columns={columns}
        query={users}
        rowId={(user) => user.id}
        search={search}
        empty={<EmptyState title="Nobody yet">Invite the first person by e-mail.</EmptyState>}
      />
    </>
  )
}
