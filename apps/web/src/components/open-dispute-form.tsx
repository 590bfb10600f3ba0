import { openDispute, type PlayId } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useNavigate } from 'react-router'
import { callApi } from '../lib/api-client.ts'
import { queryRoots } from '../lib/query-roots.ts'
import { showToast } from '../lib/toasts.ts'
import { Button } from './button.tsx'
import { Form, useContractForm } from './form.tsx'
import { TextAreaField } from './text-field.tsx'

/** Disputes one play with a reason and goes on to the dispute. */
export function OpenDisputeForm({ playId, onCancel }: { playId: PlayId; onCancel: () => void }) {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  const form = useContractForm(openDispute.body, { defaultValues: { playId, reason: '' } })
  return (
    <Form
      form={form}
      guard={false}
      onSubmit={async (body) => {
        const dispute = await callApi(openDispute, { body })
        showToast(`Dispute ${dispute.number} is open.`)
        void queryClient.invalidateQueries({ queryKey: queryRoots.detections })
        void queryClient.invalidateQueries({ queryKey: queryRoots.plays })
        void queryClient.invalidateQueries({ queryKey: queryRoots.disputes })
        await navigate(`/disputes/${dispute.id}`)
      }}
      actions={
        <>
          <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
            Open the dispute
          </Button>
          <Button onClick={onCancel}>Leave it</Button>
        </>
      }
    >
      <TextAreaField
        {...form.register('reason')}
        label="What is wrong with this play"
        hint="A clerk answers and decides. Say what you heard and where, so that they can hear it too."
      />
    </Form>
  )
}
