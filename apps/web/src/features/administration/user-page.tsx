import { inviteUser, updateUser, userUpdateSchema, type UserView } from '@fieldfare/contracts'
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { MailPlus } from 'lucide-react'
import { useController, useWatch } from 'react-hook-form'
import { useParams } from 'react-router'
import { Button } from '../../components/button.tsx'
import { ChoiceGroup, RadioField } from '../../components/choice-field.tsx'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { ErrorState, QueryState } from '../../components/states.tsx'
import { TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { useSession } from '../../lib/session.ts'
import { showToast } from '../../lib/toasts.ts'
import { userQuery } from './administration-queries.ts'
import { PartiesField, RoleField, StationsField } from './scope-fields.tsx'
import { scopeOfRole } from './scope-of-role.ts'
import { UserStatusTag } from './user-status-tag.tsx'

export function UserPage() {
  const { userId = '' } = useParams()
  const user = useQuery(userQuery(userId))
  return (
    <QueryState query={user} loading="Fetching the user">
      {(data) => <UserDetails key={data.id} user={data} />}
    </QueryState>
  )
}

function UserDetails({ user }: { user: UserView }) {
  const { user: self } = useSession()
  return (
    <>
      <PageHeader
        title={user.name}
        breadcrumbs={[{ label: 'Users', to: '/users' }]}
        aside={<UserStatusTag status={user.status} />}
        lead={user.email}
      />
      <DefinitionList
        items={[
          { term: 'Here since', value: <SocietyTime instant={user.createdAt} /> },
          {
            term: 'Last sign-in',
            value: user.lastSignInAt === null ? 'Never' : <SocietyTime instant={user.lastSignInAt} />,
          },
        ]}
      />
      {user.status === 'invited' ? (
        <InviteAgain user={user} />
      ) : (
        <Section
          title="Role and scope"
          lead="A change of role, scope or state ends the person’s sessions at once."
        >
          {self.id === user.id && (
            <div className="mb-4">
              <Notice title="This is you">Changing your own role or state signs you out.</Notice>
            </div>
          )}
          <UserForm key={`${user.role} ${user.status}`} user={user} />
        </Section>
      )}
    </>
  )
}

function InviteAgain({ user }: { user: UserView }) {
  const inviting = useMutation({
    mutationFn: () =>
      callApi(inviteUser, {
        body: {
          email: user.email,
          name: user.name,
          role: user.role,
          stationIds: user.stations.map(({ id }) => id),
          partyIds: user.parties.map(({ id }) => id),
        },
      }),
    onSuccess: () => showToast(`A new link is on its way to ${user.email}.`),
  })
  return (
    <Section title="Invitation" lead="The person has not set a password yet.">
      <div className="grid justify-items-start gap-3">
        <p>A new link replaces the one sent before.</p>
        <Button tone="main" icon={MailPlus} busy={inviting.isPending} onClick={() => inviting.mutate()}>
          Send a new link
        </Button>
        {inviting.error !== null && <ErrorState error={inviting.error} />}
      </div>
    </Section>
  )
}

function UserForm({ user }: { user: UserView }) {
  const queryClient = useQueryClient()
  const form = useContractForm(userUpdateSchema, {
    defaultValues: {
      name: user.name,
      status: user.status === 'disabled' ? 'disabled' : 'active',
      role: user.role,
      stationIds: user.stations.map(({ id }) => id),
      partyIds: user.parties.map(({ id }) => id),
    },
  })
  const { control } = form
  const role = useController({ control, name: 'role' }).field
  const stationIds = useController({ control, name: 'stationIds' }).field
  const partyIds = useController({ control, name: 'partyIds' }).field
  const chosenRole = useWatch({ control, name: 'role' })
  return (
    <Form
      form={form}
      onSubmit={async (values) => {
        const body = scopeOfRole(values)
        const changed = await callApi(updateUser, { params: { userId: user.id }, body })
        form.reset(body)
        queryClient.setQueryData(userQuery(user.id).queryKey, changed)
        showToast(`${changed.name} is saved.`)
        await refreshScopes(queryClient, 'administration')
      }}
      actions={
        <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
          Save
        </Button>
      }
    >
      <TextField {...form.register('name')} label="Name" autoComplete="off" />
      <ChoiceGroup legend="State" name="status">
        <RadioField {...form.register('status')} value="active" label="Active: may sign in" />
        <RadioField
          {...form.register('status')}
          value="disabled"
          label="Disabled: may not sign in; what they did stays on record"
        />
      </ChoiceGroup>
      <RoleField value={role.value} onChange={role.onChange} />
      {chosenRole === 'uploader' && (
        <StationsField value={stationIds.value ?? []} onChange={stationIds.onChange} />
      )}
      {chosenRole === 'publisher' && <PartiesField present={user.parties} onChange={partyIds.onChange} />}
    </Form>
  )
}
