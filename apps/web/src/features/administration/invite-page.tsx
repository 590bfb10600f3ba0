import { inviteUser, roleSchema, userInvitationSchema, type UserView } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useController, useWatch } from 'react-hook-form'
import { useNavigate } from 'react-router'
import type { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { showToast } from '../../lib/toasts.ts'
import { PartiesField, RoleField, StationsField } from './scope-fields.tsx'
import { scopeOfRole } from './scope-of-role.ts'

type Invitation = z.output<typeof userInvitationSchema>

export function InvitePage() {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  const invite = async (invitation: Invitation) => {
    const user: UserView = await callApi(inviteUser, { body: scopeOfRole(invitation) })
    showToast(`The invitation to ${user.email} is on its way.`)
    await refreshScopes(queryClient, 'administration')
    await navigate('/users')
  }
  return (
    <>
      <PageHeader
        title="Invite a person"
        breadcrumbs={[{ label: 'Users', to: '/users' }]}
        lead="They get an e-mail with a link, confirm their name and set a password. Inviting the same address again sends a new link."
      />
      <InviteForm onInvite={invite} onCancel={() => void navigate('/users')} />
    </>
  )
}

type InviteFormProps = { onInvite: (invitation: Invitation) => Promise<void>; onCancel: () => void }

function InviteForm({ onInvite, onCancel }: InviteFormProps) {
  const form = useContractForm(userInvitationSchema, {
    defaultValues: { email: '', name: '', role: 'uploader', stationIds: [], partyIds: [] },
  })
  const { control } = form
  const role = useController({ control, name: 'role' }).field
  const stationIds = useController({ control, name: 'stationIds' }).field
  const partyIds = useController({ control, name: 'partyIds' }).field
  const chosenRole = roleSchema.catch('uploader').parse(useWatch({ control, name: 'role' }))
  return (
    <Form
      form={form}
      onSubmit={onInvite}
      actions={
        <>
          <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
            Send the invitation
          </Button>
          <Button onClick={onCancel}>Cancel</Button>
        </>
      }
    >
      <TextField {...form.register('email')} label="E-mail address" type="email" autoComplete="off" />
      <TextField {...form.register('name')} label="Name" autoComplete="off" />
      <RoleField value={role.value} onChange={role.onChange} />
      {chosenRole === 'uploader' && (
        <StationsField value={stationIds.value ?? []} onChange={stationIds.onChange} />
      )}
      {chosenRole === 'publisher' && <PartiesField present={[]} onChange={partyIds.onChange} />}
    </Form>
  )
}
