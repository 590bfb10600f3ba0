import {
  approveDistribution,
  calculateDistribution,
  issueDistribution,
  type DistributionView,
} from '@fieldfare/contracts'
import { useMutation, useQueryClient } from '@tanstack/react-query'
import { Calculator, CheckCheck, RotateCcw, Send } from 'lucide-react'
import { useState } from 'react'
import { Button } from '../../components/button.tsx'
import { ConfirmDialog } from '../../components/confirm-dialog.tsx'
import { Money } from '../../components/money.tsx'
import { ErrorState } from '../../components/states.tsx'
import { useRole } from '../../lib/session.ts'
import { callApi } from '../../lib/api-client.ts'
import { formatMonth } from '../../lib/format-time.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { showToast } from '../../lib/toasts.ts'
import { distributionQuery } from './distributions-queries.ts'
import { ReopenForm } from './reopen-form.tsx'
import { shortDigest } from './run-facts.tsx'
import { WorkInHand, type RunProgress } from './work-in-hand.tsx'

type StepsProps = { view: DistributionView; progress: RunProgress | null }
type Asking = 'approve' | 'issue' | 'reopen' | null

/** The next step of the month, with the reason where it cannot be taken. */
export function DistributionSteps({ view, progress }: StepsProps) {
  const isClerk = useRole() === 'clerk'
  if (view.status === 'calculating' || (view.status === 'issuing' && view.failure === null)) {
    return <WorkInHand status={view.status} progress={progress} />
  }
  return isClerk ? <ClerkSteps view={view} /> : null
}

function ClerkSteps({ view }: { view: DistributionView }) {
  const [asking, setAsking] = useState<Asking>(null)
  const takeOver = useTakeOver(view.month)
  const calculating = useMutation({
    mutationFn: () => callApi(calculateDistribution, { params: { month: view.month } }),
    onSuccess: takeOver,
  })
  const { steps, status } = view
  const close = () => setAsking(null)
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap gap-2">
        {(status === 'open' || status === 'calculated') && (
          <Button
            tone={status === 'open' ? 'main' : 'plain'}
            icon={Calculator}
            busy={calculating.isPending}
            disabled={!steps.calculate.allowed}
            onClick={() => calculating.mutate()}
          >
            {status === 'open' ? 'Calculate the month' : 'Calculate again'}
          </Button>
        )}
        {status === 'calculated' && (
          <Button
            tone="main"
            icon={CheckCheck}
            disabled={!steps.approve.allowed}
            onClick={() => setAsking('approve')}
          >
            Approve
          </Button>
        )}
        {(status === 'approved' || status === 'issuing') && (
          <Button tone="main" icon={Send} disabled={!steps.issue.allowed} onClick={() => setAsking('issue')}>
            {status === 'issuing' ? 'Make the statements again' : 'Issue the statements'}
          </Button>
        )}
        {steps.reopen.allowed && asking !== 'reopen' && (
          <Button icon={RotateCcw} onClick={() => setAsking('reopen')}>
            Return to open
          </Button>
        )}
      </div>
      <WhyNot view={view} />
      {calculating.error !== null && <ErrorState error={calculating.error} />}
      {asking === 'reopen' && <ReopenForm month={view.month} onDone={takeOver} onCancel={close} />}
      <ApproveDialog view={view} isOpen={asking === 'approve'} onDone={takeOver} onClose={close} />
      <IssueDialog view={view} isOpen={asking === 'issue'} onDone={takeOver} onClose={close} />
    </div>
  )
}

function useTakeOver(month: string) {
  const queryClient = useQueryClient()
  return async (view: DistributionView) => {
    await refreshScopes(queryClient, 'distributions', 'statements', 'months', 'overview', 'plays')
    queryClient.setQueryData(distributionQuery(month).queryKey, view)
  }
}

/** The reason the step that comes next is closed to this person. */
function WhyNot({ view: { status, steps } }: { view: DistributionView }) {
  const reason = {
    open: steps.calculate.reason,
    calculating: null,
    calculated: steps.approve.reason,
    approved: steps.issue.reason,
    issuing: steps.issue.reason,
    issued: 'The month is issued and does not change any more.',
  }[status]
  if (reason === null) return null
  return <p className="max-w-prose text-slate">{reason}</p>
}

type DialogProps = {
  view: DistributionView
  isOpen: boolean
  onDone: (view: DistributionView) => Promise<void>
  onClose: () => void
}

function ApproveDialog({ view, isOpen, onDone, onClose }: DialogProps) {
  const { month, digest } = view
  if (digest === null) return null
  return (
    <ConfirmDialog
      isOpen={isOpen}
      tone="main"
      title={`Approve the distribution of ${formatMonth(month)}?`}
      confirmLabel={`Approve ${formatMonth(month)}`}
      onClose={onClose}
      onConfirm={async () => {
        await onDone(await callApi(approveDistribution, { params: { month }, body: { digest } }))
        showToast(`${formatMonth(month)} is approved.`)
      }}
    >
      <p>
        You confirm as the second person that this result is right:{' '}
        <Money amountMinor={view.netMinor ?? '0'} /> net, of which{' '}
        <Money amountMinor={view.allocatedMinor ?? '0'} /> goes to {view.payees} payees and{' '}
        <Money amountMinor={view.heldBackMinor ?? '0'} /> is held back.
      </p>
      <p className="text-slate">
        Digest <code className="figures">{shortDigest(digest)}</code>. The month can be returned to open until
        its statements are issued.
      </p>
    </ConfirmDialog>
  )
}

function IssueDialog({ view, isOpen, onDone, onClose }: DialogProps) {
  const { month } = view
  return (
    <ConfirmDialog
      isOpen={isOpen}
      title={`Issue the statements of ${formatMonth(month)}?`}
      confirmLabel={`Issue ${formatMonth(month)}`}
      onClose={onClose}
      onConfirm={async () => {
        await onDone(await callApi(issueDistribution, { params: { month } }))
        showToast('The statements are being made.')
      }}
    >
      <p>
        {view.payees} statements are made and opened to their publishers. This cannot be undone: the month
        never changes afterwards, and corrections are booked in a later month.
      </p>
    </ConfirmDialog>
  )
}
