import { endSession, signOutEverywhere, type EndpointOutput, type listSessions } from '@fieldfare/contracts'
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { LogOut } from 'lucide-react'
import { useState } from 'react'
import { useNavigate } from 'react-router'
import { Button } from '../../components/button.tsx'
import { ConfirmDialog } from '../../components/confirm-dialog.tsx'
import { ErrorState, QueryState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { callApi } from '../../lib/api-client.ts'
import { useSession } from '../../lib/session.ts'
import { showToast } from '../../lib/toasts.ts'
import { sessionsQuery } from './account-queries.ts'
import { describeUserAgent } from './user-agent.ts'

type SessionSummary = EndpointOutput<typeof listSessions>['items'][number]

export function MySessions() {
  const sessions = useQuery(sessionsQuery())
  const [isAsking, setIsAsking] = useState(false)
  const queryClient = useQueryClient()
  const navigate = useNavigate()
  return (
    <div className="grid gap-4">
      <QueryState query={sessions} loading="Fetching your sessions">
        {({ items }) => (
          <ul className="divide-y divide-hairline border-y border-hairline">
            {items.map((session) => (
              <SessionRow key={session.id} session={session} />
            ))}
          </ul>
        )}
      </QueryState>
      <div>
        <Button tone="danger" icon={LogOut} onClick={() => setIsAsking(true)}>
          Sign out everywhere
        </Button>
      </div>
      <ConfirmDialog
        isOpen={isAsking}
        title="Sign out everywhere?"
        confirmLabel="Sign out everywhere"
        onClose={() => setIsAsking(false)}
        onConfirm={async () => {
          await callApi(signOutEverywhere)
          queryClient.clear()
          await navigate('/sign-in')
        }}
      >
        <p>All your sessions end at once, this one too. What you have not saved on another device is lost.</p>
      </ConfirmDialog>
    </div>
  )
}

function SessionRow({ session }: { session: SessionSummary }) {
  const { society } = useSession()
  const queryClient = useQueryClient()
  const ending = useMutation({
    mutationFn: () => callApi(endSession, { params: { sessionId: session.id } }),
    onSuccess: async () => {
      showToast('The session has ended.')
      await queryClient.invalidateQueries({ queryKey: sessionsQuery().queryKey })
    },
  })
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 py-3">
      <div className="min-w-0">
        <p className="font-semibold">{describeUserAgent(session.userAgent)}</p>
        <p className="text-sm text-slate">
          Last used <StationTime instant={session.lastUsedAt} timeZone={society.timeZone} />, open since{' '}
          <StationTime instant={session.createdAt} timeZone={society.timeZone} />
        </p>
        {ending.error !== null && <ErrorState error={ending.error} />}
      </div>
      {session.isCurrent ? (
        <StatusTag tone="good">This session</StatusTag>
      ) : (
        <Button busy={ending.isPending} onClick={() => ending.mutate()}>
          End this session
        </Button>
      )}
    </li>
  )
}
