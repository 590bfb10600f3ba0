import { replyToDispute } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextAreaField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { disputeQuery } from './disputes-queries.ts'

/** Adds a message to an open dispute. */
export function ReplyForm({ disputeId }: { disputeId: string }) {
  const queryClient = useQueryClient()
  const form = useContractForm(replyToDispute.body, { defaultValues: { text: '' } })
  return (
    <Form
      form={form}
      onSubmit={async (body) => {
        const dispute = await callApi(replyToDispute, { params: { disputeId }, body })
        queryClient.setQueryData(disputeQuery(disputeId).queryKey, dispute)
        form.reset()
        showToast('Your message is sent.')
      }}
      actions={
        <Button type="submit" busy={form.formState.isSubmitting}>
          Send the message
        </Button>
      }
    >
      <TextAreaField {...form.register('text')} label="Your message" rows={4} />
    </Form>
  )
}
