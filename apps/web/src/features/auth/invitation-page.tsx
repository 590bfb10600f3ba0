import { acceptInvitation, readInvitation, roleLabels } from '@fieldfare/contracts'
import { queryOptions, useQuery, useQueryClient } from '@tanstack/react-query'
import { useLocation, useNavigate } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { ErrorState, LoadingState } from '../../components/states.tsx'
import { TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { sessionQuery } from '../../lib/session.ts'
import { AuthLayout } from './auth-layout.tsx'
import { BrokenLink } from './broken-link.tsx'
import { readLinkToken } from './link-token.ts'
import { invitationFormSchema, passwordHint } from './new-password.ts'

function invitationQuery(token: string) {
  return queryOptions({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => callApi(readInvitation, { body: { token }, signal }),
    staleTime: Infinity,
  })
}

export function InvitationPage() {
  const token = readLinkToken(useLocation())
  if (token === null) {
    return (
      <BrokenLink title="This invitation is not complete">
        Open the link from the e-mail again, the whole of it, or ask an administrator to send it anew.
      </BrokenLink>
    )
  }
  return <Invitation token={token} />
}

function Invitation({ token }: { token: string }) {
  const invitation = useQuery(invitationQuery(token))
  if (invitation.data === undefined) {
    return (
      <AuthLayout title="Your invitation">
        {invitation.error === null ? (
          <LoadingState>Reading the invitation</LoadingState>
        ) : (
          <ErrorState
            error={invitation.error}
            action={<LinkButton to="/sign-in">Go to sign-in</LinkButton>}
          />
        )}
      </AuthLayout>
    )
  }
  const { name, email, role, societyName } = invitation.data
  return (
    <AuthLayout
      title={`Welcome to ${societyName}`}
      lead={`You were invited as ${roleLabels[role]} with the address ${email}.`}
    >
      <InvitationForm token={token} name={name} />
    </AuthLayout>
  )
}

function InvitationForm({ token, name }: { token: string; name: string }) {
  const queryClient = useQueryClient()
  const navigate = useNavigate()
  const form = useContractForm(invitationFormSchema, { defaultValues: { name, password: '', repeated: '' } })
  return (
    <Form
      form={form}
      guard={false}
      onSubmit={async (values) => {
        const session = await callApi(acceptInvitation, {
          body: { token, name: values.name, password: values.password },
        })
        queryClient.clear()
        queryClient.setQueryData(sessionQuery().queryKey, session)
        await navigate('/', { replace: true })
      }}
      actions={
        <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
          Accept and sign in
        </Button>
      }
    >
      <TextField {...form.register('name')} label="Your name" autoComplete="name" />
      <TextField
        {...form.register('password')}
        type="password"
        label="Password"
        hint={passwordHint}
        autoComplete="new-password"
      />
      <TextField
        {...form.register('repeated')}
        type="password"
        label="Password again"
        autoComplete="new-password"
      />
    </Form>
  )
}
