import { createWork } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useNavigate } from 'react-router'
import { PageHeader } from '../../components/page-header.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { WorkForm } from './work-form.tsx'

export function NewWorkPage() {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  return (
    <>
      <PageHeader
        title="Add a work"
        breadcrumbs={[{ label: 'Works', to: '/works' }]}
        lead="Shares are added on its page; recordings name their work on theirs."
      />
      <WorkForm
        work={null}
        submitLabel="Add the work"
        onCancel={() => void navigate('/works')}
        onSave={async (body) => {
          const work = await callApi(createWork, { body })
          showToast(`“${work.title}” is in the catalogue.`)
          await refreshScopes(queryClient, 'works')
          await navigate(`/works/${work.id}`)
        }}
      />
    </>
  )
}
