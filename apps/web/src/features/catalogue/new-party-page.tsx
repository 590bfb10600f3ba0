import { createParty } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useNavigate } from 'react-router'
import { PageHeader } from '../../components/page-header.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { PartyForm } from './party-form.tsx'

export function NewPartyPage() {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  return (
    <>
      <PageHeader title="Add a party" breadcrumbs={[{ label: 'Parties', to: '/parties' }]} />
      <PartyForm
        party={null}
        submitLabel="Add the party"
        onCancel={() => void navigate('/parties')}
        onSave={async (body) => {
          const party = await callApi(createParty, { body })
          showToast(`${party.name} is in the catalogue.`)
          await refreshScopes(queryClient, 'parties')
          await navigate(`/parties/${party.id}`)
        }}
      />
    </>
  )
}
