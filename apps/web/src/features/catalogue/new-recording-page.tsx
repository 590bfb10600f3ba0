import { createRecording } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useNavigate } from 'react-router'
import { PageHeader } from '../../components/page-header.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { RecordingForm } from './recording-form.tsx'

export function NewRecordingPage() {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  return (
    <>
      <PageHeader
        title="Add a recording"
        breadcrumbs={[{ label: 'Recordings', to: '/recordings' }]}
        lead="Identify it first. Shares and reference audio are added on its page."
      />
      <RecordingForm
        recording={null}
        submitLabel="Add the recording"
        onCancel={() => void navigate('/recordings')}
        onSave={async (body) => {
          const recording = await callApi(createRecording, { body })
          showToast(`“${recording.title}” is in the catalogue.`)
          await refreshScopes(queryClient, 'recordings')
          await navigate(`/recordings/${recording.id}`)
        }}
      />
    </>
  )
}
