import { decideDispute, type DisputeView } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { useWatch } from 'react-hook-form'
import { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { ChoiceGroup, RadioField } from '../../components/choice-field.tsx'
import { ConfirmDialog } from '../../components/confirm-dialog.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { Notice } from '../../components/notice.tsx'
import { TextAreaField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { formatMonth } from '../../lib/format-time.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { showToast } from '../../lib/toasts.ts'
import { disputeQuery } from './disputes-queries.ts'

const decisionFormSchema = z.object({
  outcome: z
    .string()
    .refine((outcome) => outcome !== '', 'Choose how the dispute ends.')
    .pipe(decideDispute.body.shape.outcome),
  reason: decideDispute.body.shape.reason,
})
type Decision = z.output<typeof decisionFormSchema>

/** Upholds or dismisses a dispute; says what follows before it asks for good. */
export function DecideForm({ dispute }: { dispute: DisputeView }) {
  const queryClient = useQueryClient()
  const [decision, setDecision] = useState<Decision | null>(null)
  const form = useContractForm(decisionFormSchema, { defaultValues: { outcome: '', reason: '' } })
  const outcome = useWatch({ control: form.control, name: 'outcome' })
  const decide = async () => {
    if (decision === null) return
    const decided = await callApi(decideDispute, { params: { disputeId: dispute.id }, body: decision })
    form.reset()
    queryClient.setQueryData(disputeQuery(dispute.id).queryKey, decided)
    showToast(`Dispute ${dispute.number} is ${decided.status}.`)
    await refreshScopes(queryClient, 'disputes', 'plays', 'detections', 'overview', 'distributions')
  }
  return (
    <>
      <Form
        form={form}
        onSubmit={async (values) => setDecision(values)}
        actions={
          <Button type="submit" tone="main">
            Decide
          </Button>
        }
      >
        <ChoiceGroup legend="How does it end" name="outcome">
          <RadioField
            {...form.register('outcome')}
            value="upheld"
            label="Upheld: the play was wrong and is taken out of the month"
          />
          <RadioField
            {...form.register('outcome')}
            value="dismissed"
            label="Dismissed: the play was right and stays"
          />
        </ChoiceGroup>
        {outcome === 'upheld' && !dispute.isMonthOpen && <MonthIsClosed month={dispute.month} />}
        <TextAreaField
          {...form.register('reason')}
          label="Reason"
          hint="The person who opened the dispute reads it."
        />
      </Form>
      <ConfirmDialog
        isOpen={decision !== null}
        title={
          decision?.outcome === 'upheld'
            ? `Uphold dispute ${dispute.number}?`
            : `Dismiss dispute ${dispute.number}?`
        }
        confirmLabel={decision?.outcome === 'upheld' ? 'Uphold and remove the play' : 'Dismiss the dispute'}
        onConfirm={decide}
        onClose={() => setDecision(null)}
      >
        <p>
          {decision?.outcome === 'upheld'
            ? `The play of “${dispute.recording.title}” no longer counts in ${formatMonth(dispute.month)} and earns nothing.`
            : `The play of “${dispute.recording.title}” stays counted in ${formatMonth(dispute.month)}.`}{' '}
          A decision cannot be taken back.
        </p>
      </ConfirmDialog>
    </>
  )
}

function MonthIsClosed({ month }: { month: string }) {
  return (
    <Notice tone="warn" title={`${formatMonth(month)} is closed`} announce>
      A play of a closed month cannot be taken out. If the month is not issued yet, return it to open on its
      distribution page first; otherwise the play stays, and a correction belongs in a later month.
    </Notice>
  )
}
