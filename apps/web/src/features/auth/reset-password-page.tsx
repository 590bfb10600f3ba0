import { resetPassword } from '@fieldfare/contracts'
import { useLocation, useNavigate } from 'react-router'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextField } from '../../components/text-field.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { AuthLayout } from './auth-layout.tsx'
import { BrokenLink } from './broken-link.tsx'
import { readLinkToken } from './link-token.ts'
import { newPasswordSchema, passwordHint } from './new-password.ts'

export function ResetPasswordPage() {
  const token = readLinkToken(useLocation())
  const navigate = useNavigate()
  const form = useContractForm(newPasswordSchema, { defaultValues: { password: '', repeated: '' } })

  if (token === null) {
    return (
      <BrokenLink title="This link is not complete">
        Open the link from the e-mail again, the whole of it, or ask for a new one.
      </BrokenLink>
    )
  }
  return (
    <AuthLayout
      title="Set a new password"
      lead="Your open sessions end; sign in with the new password afterwards."
    >
      <Form
        form={form}
        guard={false}
        onSubmit={async ({ password }) => {
          await callApi(resetPassword, { body: { token, password } })
          showToast('The new password is set. Sign in with it.')
          await navigate('/sign-in', { replace: true })
        }}
        actions={
          <div className="flex w-full flex-wrap items-center justify-between gap-3">
            <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
              Set the password
            </Button>
            <TextLink to="/forgotten-password">Ask for a new link</TextLink>
          </div>
        }
      >
        <TextField
          {...form.register('password')}
          type="password"
          label="New password"
          hint={passwordHint}
          autoComplete="new-password"
        />
        <TextField
          {...form.register('repeated')}
          type="password"
          label="New password again"
          autoComplete="new-password"
        />
      </Form>
    </AuthLayout>
  )
}
