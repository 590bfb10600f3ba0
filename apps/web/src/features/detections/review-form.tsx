import { reviewDetection, type DetectionDetail } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { Check, X } from 'lucide-react'
import { useRef } from 'react'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextAreaField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { queryRoots } from '../../lib/query-roots.ts'
import { showToast } from '../../lib/toasts.ts'
import { detectionQuery } from './detections-queries.ts'
import { useReviewKeys } from './use-review-keys.ts'

/** Confirm or reject, with keys for those who do it all day. */
export function ReviewForm({ detection, areKeysOn }: { detection: DetectionDetail; areKeysOn: boolean }) {
  const queryClient = useQueryClient()
  const confirmButton = useRef<HTMLButtonElement>(null)
  const form = useContractForm(reviewDetection.body, {
    defaultValues: { outcome: 'confirmed', reason: '' },
  })
  useReviewKeys(areKeysOn, {
    c: () => confirmButton.current?.click(),
    r: () => form.setFocus('reason'),
  })
  const isBusy = form.formState.isSubmitting
  return (
    <Form
      form={form}
      onSubmit={async (body) => {
        const changed = await callApi(reviewDetection, { params: { detectionId: detection.id }, body })
        queryClient.setQueryData(detectionQuery(detection.id).queryKey, changed)
        // Lists are fetched anew when they are next looked at: until then this one keeps its neighbours.
        void queryClient.invalidateQueries({ queryKey: queryRoots.detections, refetchType: 'none' })
        void queryClient.invalidateQueries({ queryKey: queryRoots.plays, refetchType: 'none' })
        void queryClient.invalidateQueries({ queryKey: queryRoots.overview, refetchType: 'none' })
        form.reset()
        showToast(body.outcome === 'confirmed' ? 'The detection is confirmed.' : 'The detection is rejected.')
      }}
      actions={
        <>
          {detection.reviewState !== 'confirmed' && (
            <Button
              ref={confirmButton}
              type="submit"
              tone="main"
              icon={Check}
              busy={isBusy}
              onClick={() => form.setValue('outcome', 'confirmed')}
            >
              Confirm
            </Button>
          )}
          {detection.reviewState !== 'rejected' && (
            <Button
              type="submit"
              tone="danger"
              icon={X}
              busy={isBusy}
              onClick={() => form.setValue('outcome', 'rejected')}
            >
              Reject
            </Button>
          )}
        </>
      }
    >
      <TextAreaField
        {...form.register('reason')}
        rows={2}
        label="Reason"
        hint="Needed to reject, kept in the history either way."
      />
    </Form>
  )
}
