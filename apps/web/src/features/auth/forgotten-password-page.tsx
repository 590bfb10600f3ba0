import { requestPasswordReset } from '@fieldfare/contracts'
import { useState } from 'react'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { Notice } from '../../components/notice.tsx'
import { TextField } from '../../components/text-field.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { AuthLayout } from './auth-layout.tsx'

export function ForgottenPasswordPage() {
  const form = useContractForm(requestPasswordReset.body, { defaultValues: { email: '' } })
  const [sentTo, setSentTo] = useState<string | null>(null)

  return (
    <AuthLayout title="Forgotten password" lead="We send a link with which you set a new one.">
      {sentTo === null ? (
        <Form
          form={form}
          guard={false}
          onSubmit={async (body) => {
            await callApi(requestPasswordReset, { body })
            setSentTo(body.email)
          }}
          actions={
            <div className="flex w-full flex-wrap items-center justify-between gap-3">
              <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
                Send the link
              </Button>
              <TextLink to="/sign-in">Back to sign-in</TextLink>
            </div>
          }
        >
          <TextField
            {...form.register('email')}
            type="email"
            label="E-mail address"
            autoComplete="username"
          />
        </Form>
      ) : (
        <>
          <Notice tone="good" announce title="Look in your mail">
            If {sentTo} belongs to an account here, a link is on its way. It works once and for a short time.
          </Notice>
          <p>
            <TextLink to="/sign-in">Back to sign-in</TextLink>
          </p>
        </>
      )}
    </AuthLayout>
  )
}
