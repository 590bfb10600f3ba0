import { signIn } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextField } from '../../components/text-field.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { readReturnAddress } from '../../lib/return-address.ts'
import { sessionQuery } from '../../lib/session.ts'
import { AuthLayout } from './auth-layout.tsx'

export function SignInPage() {
  const queryClient = useQueryClient()
  const navigate = useNavigate()
  const [search] = useSearchParams()
  const form = useContractForm(signIn.body, { defaultValues: { email: '', password: '' } })
  const returnAddress = readReturnAddress(search)

  return (
    <AuthLayout
      title="Sign in"
      {...(returnAddress === '/' ? {} : { lead: 'You come back to the page you asked for.' })}
    >
      <Form
        form={form}
        guard={false}
        onSubmit={async (body) => {
          const session = await callApi(signIn, { body })
          queryClient.clear()
          queryClient.setQueryData(sessionQuery().queryKey, session)
          await navigate(returnAddress, { replace: true })
        }}
        actions={
          <div className="flex w-full flex-wrap items-center justify-between gap-3">
            <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
              Sign in
            </Button>
            <TextLink to="/forgotten-password">Forgotten password</TextLink>
          </div>
        }
      >
        <TextField {...form.register('email')} type="email" label="E-mail address" autoComplete="username" />
        <TextField
          {...form.register('password')}
          type="password"
          label="Password"
          autoComplete="current-password"
        />
      </Form>
    </AuthLayout>
  )
}
