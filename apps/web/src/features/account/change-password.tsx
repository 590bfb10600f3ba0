import { changePassword } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { sessionsQuery } from './account-queries.ts'

export function ChangePassword() {
  const queryClient = useQueryClient()
  const form = useContractForm(changePassword.body, {
    defaultValues: { currentPassword: '', newPassword: '' },
  })
  return (
    <Form
      form={form}
      onSubmit={async (body) => {
        await callApi(changePassword, { body })
        form.reset()
        showToast('Your password is changed. Your other sessions have ended.')
        await queryClient.invalidateQueries({ queryKey: sessionsQuery().queryKey })
      }}
      actions={
        <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
          Change the password
        </Button>
      }
    >
      <TextField
        {...form.register('currentPassword')}
        type="password"
        label="Present password"
        autoComplete="current-password"
      />
      <TextField
        {...form.register('newPassword')}
        type="password"
        label="New password"
        hint="At least 12 characters."
        autoComplete="new-password"
      />
    </Form>
  )
}
