import { reopenDistribution, type DistributionView } from '@fieldfare/contracts'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { Notice } from '../../components/notice.tsx'
import { TextAreaField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { formatMonth } from '../../lib/format-time.ts'
import { showToast } from '../../lib/toasts.ts'

type ReopenFormProps = {
  month: string
  onDone: (view: DistributionView) => Promise<void>
  onCancel: () => void
}

/** Returns a month to open, with the reason kept in the audit trail. */
export function ReopenForm({ month, onDone, onCancel }: ReopenFormProps) {
  const form = useContractForm(reopenDistribution.body, { defaultValues: { reason: '' } })
  return (
    <Notice title={`Return ${formatMonth(month)} to open`}>
      <p className="mb-4">
        What was calculated, and an approval, are withdrawn; plays and shares can change again. The audit
        trail keeps your reason.
      </p>
      <Form
        form={form}
        onSubmit={async (body) => {
          await onDone(await callApi(reopenDistribution, { params: { month }, body }))
          onCancel()
          showToast(`${formatMonth(month)} is open again.`)
        }}
        actions={
          <>
            <Button type="submit" tone="danger" busy={form.formState.isSubmitting}>
              Return to open
            </Button>
            <Button onClick={onCancel}>Keep as it is</Button>
          </>
        }
      >
        <TextAreaField {...form.register('reason')} label="Reason" rows={3} />
      </Form>
    </Notice>
  )
}
